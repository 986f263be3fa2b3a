/** One list of requests through the three doors: in process as the command line, over loopback, over Electron's channel. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { requests, type RequestName } from '../../app/contract/requests.ts'
import type { Envelope } from '../../app/contract/wire.ts'
import { writeBuilding } from '../../app/model/write-building.ts'
import { buildStale } from '../../app/shells/build.ts'
import { loadProjects, nodeContext } from '../../app/shells/context.ts'
import { startCore, type Core } from '../../app/shells/core.ts'
import { CHANNEL, startDesktop } from '../../app/shells/desktop.ts'
import { serveLoopback } from '../../app/shells/loopback.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { dispatch } from '../../app/usecases/handlers.ts'
import type { Session } from '../../app/usecases/ports.ts'
import { fakeElectron } from '../support/electron.ts'

const dist = join(import.meta.dirname, '..', '..', 'dist')
const options = { round: 'R6', paper: 'A4', surveyed_by: 'S', assessed_by: 'A', reviewer: 'R' }
const given = exampleBuilding().supports.map((s) => ({ point: `S-${s.id}`, level_m: 42.72, sd_mm: 0.3 }))
const move = {
  what: 'Move support A1',
  changes: [
    {
      kind: 'support',
      id: 'A1',
      before: { id: 'A1', x_m: 0, y_m: 0, base_m: -1.2 },
      after: { id: 'A1', x_m: 0.05, y_m: 0, base_m: -1.2 },
    },
  ],
}

/** Every request, right and wrong, in an order in which a person might ask; HERE stands for the folder of the door. */
const LIST: readonly (readonly [name: RequestName | 'no/such' | 'constructor', input: unknown])[] = [
  ['project/view', {}],
  ['assess/findings', {}],
  ['files/list', { folder: 'HERE' }],
  ['files/list', { folder: 'HERE/none' }],
  ['project/example', { path: 'HERE/x.levelstead' }],
  ['project/example', { path: 'HERE/x.levelstead' }],
  ['project/view', {}],
  ['describe/edit', move],
  ['describe/edit', move],
  ['project/undo', {}],
  ['project/redo', {}],
  ['project/redo', {}],
  ['project/undo', {}],
  ['rounds/draft', { id: 'R7', date: '2026-12-14', levels: [{ point: 'S-A1' }] }],
  ['rounds/accept', { round: 'R7' }],
  ['rounds/draft', { id: 'R7', date: '2026-12-14', levels: given }],
  ['rounds/accept', { round: 'R7', note: 'dry, still' }],
  ['rounds/draft', { id: 'R7', date: '2026-12-14', levels: given }],
  ['rounds/draft', { id: 'R8', date: '2026-12-15', levels: [] }],
  ['rounds/discard', { round: 'R8' }],
  ['rounds/discard', { round: 'R8' }],
  ['rounds/correct', { round: { id: 'R7', date: '2026-12-13', levels: given }, reason: 'the day was wrong' }],
  ['rounds/baseline', { round: 'R1', reason: 'a trial' }],
  ['rounds/baseline', { round: 'R0', reason: 'back' }],
  ['rounds/baseline', { round: 'R99', reason: 'no' }],
  ['assess/findings', {}],
  ['assess/findings', { round: 'R3' }],
  ['assess/findings', { round: 'R99' }],
  ['report/register', {}],
  ['report/preview', { ...options, round: 'R0' }],
  ['report/preview', options],
  ['report/issue', options],
  ['report/register', {}],
  ['report/pdf', { number: 1 }],
  ['report/pdf', { number: 9 }],
  ['report/save', { number: 1, to: 'HERE/one.pdf' }],
  ['exchange/export', { to: 'HERE/x.building.json' }],
  ['exchange/readings', { to: 'HERE/out.csv' }],
  ['exchange/readings', { to: 'HERE/out.csv' }],
  ['exchange/log', { from: 'HERE/none.csv' }],
  ['exchange/log', { from: 'HERE/visit.csv' }],
  ['project/duplicate', { path: 'HERE/copy.levelstead' }],
  ['project/close', {}],
  ['project/undo', {}],
  ['exchange/import', { from: 'HERE/in.building.json', to: 'HERE/in.levelstead' }],
  ['exchange/import', { from: 'HERE/bad.building.json', to: 'HERE/bad.levelstead' }],
  ['project/open', { path: 'HERE/none.levelstead' }],
  ['project/open', { path: 'HERE/in.building.json' }],
  ['project/open', { path: 'HERE/copy.levelstead' }],
  ['project/new', { path: 'HERE/new.levelstead', name: 'Empty' }],
  ['project/new', { path: 'HERE/new.levelstead' }],
  ['verify/run', {}],
  ['verify/run', { surplus: 1 }],
  ['no/such', {}],
  ['constructor', {}],
]

type Door = (name: string, input: unknown) => Promise<Envelope>

function folder(): string {
  const path = mkdtempSync(join(tmpdir(), 'levelstead-door-'))
  writeFileSync(join(path, 'in.building.json'), writeBuilding(exampleBuilding()))
  writeFileSync(join(path, 'bad.building.json'), '{"format": "levelstead-building"')
  const rows = given.map((g) => `R9,2026-12-28,${g.point},${g.level_m},${g.sd_mm}`)
  writeFileSync(join(path, 'visit.csv'), `round,date,point,level_m,sd_mm\n${rows.join('\n')}\n`)
  return path
}

/** Without what must differ: the folder, the time, the printed bytes that carry it. */
function plain(envelope: Envelope, here: string): unknown {
  const text = JSON.stringify(envelope)
    .replaceAll(here, 'HERE')
    .replace(/\d{4}-\d\d-\d\dT\d\d:\d\d:\d\dZ/g, 'NOW')
    .replace(/"pdf":"[^"]*"/g, '"pdf":"PDF"')
    .replace(/"sha256":"\w+"/g, '"sha256":"HASH"')
  return JSON.parse(text) as unknown
}

async function answers(door: Door, here: string): Promise<unknown[]> {
  const found: unknown[] = []
  for (const [name, input] of LIST) {
    const asked = JSON.parse(JSON.stringify(input).replaceAll('HERE', here)) as unknown
    found.push(plain(await door(name, asked), here))
  }
  return found
}

function core(): Core {
  return startCore(pathToFileURL(join(dist, 'core-worker.js')), { shell: 'browser' })
}

describe('the three doors', () => {
  const folders: string[] = []
  let inProcess: unknown[]
  let loopback: unknown[]
  let channel: unknown[]

  beforeAll(async () => {
    await buildStale(['core'])
    folders.push(folder(), folder(), folder())

    const session: Session = { project: null }
    const context = nodeContext({ shell: 'browser', projects: await loadProjects(), session })
    inProcess = await answers((name, input) => dispatch(name, input, context), folders[0]!)
    session.project?.close()

    const door = await serveLoopback({ core: core(), files: new Map() })
    const address = `http://127.0.0.1:${door.house.port}`
    const headers = { 'x-levelstead-token': door.house.token, 'content-type': 'application/json' }
    loopback = await answers(async (name, input) => {
      const body = JSON.stringify({ id: '1', input })
      return (await (await fetch(`${address}/call/${name}`, { method: 'POST', headers, body })).json()) as Envelope
    }, folders[1]!)
    await door.close()

    const fake = fakeElectron()
    const desktop = core()
    startDesktop(fake.electron, { core: desktop, files: new Map(), preload: '', args: [] })
    await new Promise((settle) => setTimeout(settle, 5))
    const call = fake.handlers.get(CHANNEL)! as (...args: unknown[]) => Promise<Envelope>
    const event = { senderFrame: fake.windows[0]!.contents.mainFrame }
    channel = await answers((name, input) => call(event, { id: '1', name, input }), folders[2]!)
    await desktop.close()
  })
  afterAll(() => folders.forEach((path) => rmSync(path, { recursive: true, force: true })))

  it.each(LIST.map(([name, input], i) => [i, name, JSON.stringify(input).slice(0, 60)] as const))(
    'answer alike: %i %s %s',
    (i) => {
      expect(loopback[i]).toEqual(inProcess[i])
      expect(channel[i]).toEqual(inProcess[i])
    },
  )

  it('were asked everything that there is to ask, and were answered both ways', () => {
    const names = new Set<string>(LIST.map(([name]) => name))
    const unasked = Object.keys(requests).filter((name) => !names.has(name))
    // What each shell says of itself is its own.
    expect(unasked).toEqual(['about/view'])
    const outcomes = inProcess.map((e) => (e as Envelope).ok)
    expect(outcomes.filter(Boolean).length).toBeGreaterThan(25)
    expect(outcomes.filter((ok) => !ok).length).toBeGreaterThan(12)
    expect(inProcess.filter((e) => 'bug' in (e as object))).toEqual([])
  })
})
