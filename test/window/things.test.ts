import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { elevation } from '../../app/drawing/elevation.ts'
import { plan } from '../../app/drawing/plan.ts'
import type { Primitive, Scene } from '../../app/drawing/scene.ts'
import { exampleBuilding } from '../../app/usecases/example-building.ts'
import { nextThing, thingsOf, type Direction, type Thing } from '../../renderer/sheet/things.ts'

const building = exampleBuilding()
const findings = assessBuilding(building).rounds.at(-1)!
const line = building.frame_lines.find((l) => l.id === '4')!

function flat(primitives: readonly Primitive[]): Primitive[] {
  return primitives.flatMap((p) =>
    p.shape === 'group'
      ? flat(p.children.map((c) => ({ ...c, target: c.target ?? p.target, label: c.label ?? p.label })))
      : [p],
  )
}

function onSheet(scene: Scene): Thing[] {
  return thingsOf(flat(scene.primitives))
}

function nameOf({ target }: Thing): string {
  return target.kind === 'span' ? `${target.from}-${target.to}` : target.id
}

describe('the keyboard on a drawing', () => {
  const things = onSheet(elevation({ building, findings, line: '4', width: 200, height: 130 }))

  it('finds every member, span and support of the line once', () => {
    const names = things.map(({ target }) => `${target.kind} ${nameOf({ target } as Thing)}`)
    expect(new Set(names).size).toBe(names.length)
    expect(names).toEqual(
      expect.arrayContaining([
        ...line.members.map((m) => `member ${m.id}`),
        ...line.nodes.flatMap((n) => (n.support ? [`support ${n.support}`] : [])),
        'span A4-B4',
        'span B4-C4',
      ]),
    )
  })

  it('says something of each thing', () => {
    expect(things.filter(({ label }) => label === '')).toEqual([])
    expect(things.find((t) => nameOf(t) === 'A4-B4/2')?.label).toMatch(/^Beam A4-B4\/2: induced .* red, clear$/)
  })

  it('goes along a floor from beam to beam, and down to the column beneath', () => {
    const beam = things.find((t) => nameOf(t) === 'A4-B4/2')!
    const right = nextThing(things, beam, 'right')!
    expect(nameOf(right)).toBe('B4-C4/2')
    expect(nextThing(things, right, 'left')).toBe(beam)
    const column = things.find((t) => nameOf(t) === 'CB4/2')!
    expect(nameOf(nextThing(things, column, 'down')!)).toBe('CB4/1')
  })

  it('reaches every thing on plan and elevation by the arrows', () => {
    const drawings = [things, onSheet(plan({ building, findings, width: 200, height: 130 }))]
    for (const drawing of drawings) expect(unreached(drawing).map(nameOf)).toEqual([])
  })

  it('begins at the top left, and stays where there is nothing further', () => {
    const first = nextThing(things, undefined, 'down')!
    expect(nextThing(things, first, 'up')).toBeUndefined()
    expect(nextThing([], undefined, 'left')).toBeUndefined()
  })
})

/** Things that no walk of arrows from the first one comes to. */
function unreached(things: readonly Thing[]): Thing[] {
  const seen = new Set<Thing>()
  const open = [nextThing(things, undefined, 'down')!]
  while (open.length > 0) {
    const thing = open.pop()!
    if (seen.has(thing)) continue
    seen.add(thing)
    for (const direction of ['left', 'right', 'up', 'down'] satisfies Direction[]) {
      const next = nextThing(things, thing, direction)
      if (next) open.push(next)
    }
  }
  return things.filter((thing) => !seen.has(thing))
}
