import { svelte } from '@sveltejs/vite-plugin-svelte'
import { defineConfig } from 'vite'

const root = new URL('.', import.meta.url).pathname

export default defineConfig({
  root,
  // Our own scheme and loopback alike serve it from their top.
  base: './',
  plugins: [svelte({ configFile: `${root}svelte.config.js` })],
  build: {
    outDir: '../dist/window',
    emptyOutDir: true,
    target: 'chrome120',
    // Nothing inline: the content policy lets in files of ours alone.
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    rolldownOptions: { checks: { pluginTimings: false } },
    chunkSizeWarningLimit: 1500,
  },
})
