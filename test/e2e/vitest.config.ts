import { defineConfig } from 'vitest/config'

export default defineConfig({
  test: {
    root: new URL('../..', import.meta.url).pathname,
    include: ['test/e2e/**/*.e2e.ts'],
    testTimeout: 120_000,
    hookTimeout: 120_000,
    // What is waited for comes at once on a free machine; a busy one gets its time.
    expect: { poll: { timeout: 15_000 } },
    // One browser at a time: two cores, and pictures that are to be the same.
    fileParallelism: false,
  },
})
