import { existsSync, readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { join } from 'node:path'
import { Ajv } from 'ajv'
import { beforeAll, describe, expect, it } from 'vitest'
import { buildStale } from '../../app/shells/build.ts'

const root = join(import.meta.dirname, '..', '..')
const builder = createRequire(createRequire(import.meta.url).resolve('electron-builder'))
const library = builder.resolve('app-builder-lib/package.json')

interface Configuration {
  files: string[]
  asarUnpack: string[]
  fileAssociations: { ext: string }[]
  win: { target: unknown[] }
  mac: { target: unknown[] }
  linux: { target: unknown[] }
}

describe('electron-builder.yml', () => {
  let configuration: Configuration

  beforeAll(async () => {
    const { load } = createRequire(library)('js-yaml') as { load: (text: string) => unknown }
    configuration = load(readFileSync(join(root, 'electron-builder.yml'), 'utf8')) as Configuration
    await buildStale()
  })

  it('is right by electron-builder’s own schema', () => {
    const schema = JSON.parse(readFileSync(join(library, '..', 'scheme.json'), 'utf8')) as object
    const validate = new Ajv({ strict: false, allErrors: true }).compile(schema)
    expect([validate(configuration), validate.errors]).toEqual([true, null])
  })

  it('has a package for Windows, macOS and Linux, and opens .levelstead files', () => {
    for (const platform of ['win', 'mac', 'linux'] as const)
      expect(configuration[platform].target.length).toBeGreaterThan(0)
    expect(configuration.fileAssociations.map((a) => a.ext)).toEqual(['levelstead'])
  })

  it('keeps the native module and the typeface out of the archive', () => {
    expect(configuration.asarUnpack).toEqual(
      expect.arrayContaining(['node_modules/better-sqlite3/**', 'node_modules/pdfmake/fonts/**']),
    )
  })

  it('packs the main that package.json names, and what stands beside it', () => {
    const { main } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')) as { main: string }
    expect(main).toBe('dist/electron-main.cjs')
    for (const file of [
      main,
      'dist/electron-preload.cjs',
      'dist/core-worker.js',
      'dist/command-line.js',
      'dist/window/index.html',
    ])
      expect([file, existsSync(join(root, file))]).toEqual([file, true])
  })
})
