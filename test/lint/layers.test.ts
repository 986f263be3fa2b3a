import { readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { faultsOfFile, layerFaults } from './layers.ts'

describe('the direction of imports', () => {
  it('holds in the whole tree', () => {
    expect(layerFaults()).toEqual([])
  })

  it('is broken by each planted fault', () => {
    const planted: [string, string][] = [
      ['solver/a.ts', "import { x } from '../app/model/building.ts'"],
      ['app/model/a.ts', "export { y } from '../usecases/ports.ts'"],
      ['app/assess/a.ts', "const late = import('../../db/open.ts')"],
      ['app/assess/b.ts', "import { z } from '../../solver/frame/factor.ts'"],
      ['app/usecases/a.ts', "import fs from 'node:fs'"],
      [
        'renderer/places/A.svelte',
        '<script lang="ts">import { dispatch } from \'../../app/usecases/handlers.ts\'</script>',
      ],
      ['renderer/a.ts', "import { requests } from '../app/contract/requests.ts'"],
      ['solver/b.ts', "import left from 'left-pad'"],
      ['loose/a.ts', ''],
    ]
    for (const [file, text] of planted) expect(faultsOfFile(file, text), file).toHaveLength(1)
  })

  it('lets the window take the types of the contract', () => {
    expect(faultsOfFile('renderer/a.ts', "import type { Call } from '../app/contract/wire.ts'")).toEqual([])
  })

  it('has the top level of the house and nothing else', () => {
    const house = [
      'package.json',
      'package-lock.json',
      'tsconfig.json',
      'electron-builder.yml',
      'README.md',
      'DEVELOPERS.md',
    ]
    const folders = ['app', 'renderer', 'solver', 'db', 'test']
    const made = ['node_modules', 'dist']
    const found = readdirSync('.').filter((name) => !name.startsWith('.') && !made.includes(name))
    expect(found.filter((name) => ![...house, ...folders].includes(name))).toEqual([])
  })
})
