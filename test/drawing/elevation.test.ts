import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { deformedCurve, factorFor, pointOn } from '../../app/drawing/elevation/deformed.ts'
import { elevation } from '../../app/drawing/elevation.ts'
import { frameIn, type DrawnFrame } from '../../app/drawing/elevation/frame.ts'
import { flagWords } from '../../app/drawing/elevation/labels.ts'
import { levelWords } from '../../app/drawing/elevation/levels.ts'
import { tipsOf } from '../../app/drawing/elevation/moments.ts'
import type { Point } from '../../app/drawing/scene.ts'
import { DEFAULT_CRITERIA, type Building } from '../../app/model/building.ts'
import type { MemberFinding, RoundFindings } from '../../app/model/findings.ts'
import { flat, hall, settledGrid, textsOf } from '../support/drawn.ts'

const SHEET = { width: 170, height: 102 }
const ROOM = { x: 20, y: 20, width: 130, height: 60 }
const block = settledGrid([6, 5.4, 6], [5], [3.6, 3.2, 3.2], [0.6, 1.2, 3.4, 14, 1, 2, 3, 4])
const buildings: [string, Building][] = [
  ['a block', block],
  ['a hall with pins, a brace and slopes', hall()],
]

function framed(building: Building): { frame: DrawnFrame; findings: RoundFindings } {
  const findings = assessBuilding(building, 'R1').rounds[0]!
  return { frame: frameIn(building, building.frame_lines[0]!, ROOM, findings), findings }
}

function minus(a: Point, b: Point): Point {
  return [a[0] - b[0], a[1] - b[1]]
}

function dot(a: Point, b: Point): number {
  return a[0] * b[0] + a[1] * b[1]
}

describe('the moment diagram', () => {
  it('lies above a beam at the end that hogs and below it at the end that sags', () => {
    // A fixed beam whose right support sinks: both end moments are negative, -6EI d/L2 (slope-deflection).
    const member = { moment_from_kNm: -270, moment_to_kNm: -270 } as MemberFinding
    const beam = { from: [0, 50], to: [60, 50], length: 60 } as unknown as Parameters<typeof tipsOf>[0]
    expect(tipsOf(beam, member, 0.1)).toEqual({ fromTip: [0, 23], toTip: [60, 77] })
  })

  it('lies to the right of a column, seen upwards, where its foot sags', () => {
    const member = { moment_from_kNm: 10, moment_to_kNm: 10 } as MemberFinding
    const column = { from: [50, 60], to: [50, 30], length: 30 } as unknown as Parameters<typeof tipsOf>[0]
    expect(tipsOf(column, member, 1)).toEqual({ fromTip: [60, 60], toTip: [40, 30] })
  })

  // Bending is EI times curvature and stretches the outer side of the bend: the two lines are drawn from different findings.
  it.each(buildings)(
    'lies on the outer side of the bend of the deformed line, in the measure of it: %s',
    (_, building) => {
      const { frame } = framed(building)
      const nodes = new Map(frame.finding!.nodes.map((n) => [n.node, n]))
      const sections = new Map(building.sections.map((s) => [s.id, s]))
      const factor = 100
      let checked = 0
      for (const drawn of frame.members) {
        const finding = frame.finding!.members.find((m) => m.member === drawn.member.id)!
        const { from, c1, c2, to } = deformedCurve(drawn, nodes, frame.scale, factor)!
        const section = sections.get(drawn.member.section)!
        const EI = section.E_GPa * section.I_cm4 * (section.stiffness_factor ?? 1) * 1e-2
        const tips = tipsOf(drawn, finding, 1)
        const L = drawn.length / frame.scale
        for (const [foot, tip, bend] of [
          [drawn.from, tips.fromTip, minus(minus(from, c1), minus(c1, c2))],
          [drawn.to, tips.toTip, minus(minus(c1, c2), minus(c2, to))],
        ] as const) {
          const across: Point = [
            -(drawn.to[1] - drawn.from[1]) / drawn.length,
            (drawn.to[0] - drawn.from[0]) / drawn.length,
          ]
          const curvature = (6 * dot(bend, across)) / (factor * frame.scale) / L ** 2
          const ordinate = dot(minus(tip, foot), across)
          expect(ordinate).toBeCloseTo(-EI * curvature, 6)
          checked++
        }
      }
      expect(checked).toBe(2 * frame.members.length)
    },
  )
})

describe('the deformed line', () => {
  it.each(buildings)('begins and ends at the displacements of its nodes times the factor: %s', (_, building) => {
    const { frame } = framed(building)
    const nodes = new Map(frame.finding!.nodes.map((n) => [n.node, n]))
    for (const drawn of frame.members) {
      const curve = deformedCurve(drawn, nodes, frame.scale, 250)!
      for (const [t, end, at] of [
        [0, drawn.member.from, drawn.from],
        [1, drawn.member.to, drawn.to],
      ] as const) {
        const { x_mm, down_mm } = nodes.get(end)!
        const [x, y] = pointOn(curve, t)
        expect(x).toBeCloseTo(at[0] + (x_mm * 250 * frame.scale) / 1000, 9)
        expect(y).toBeCloseTo(at[1] + (down_mm * 250 * frame.scale) / 1000, 9)
      }
    }
  })

  it('of a member pinned at both ends stays straight', () => {
    const { frame } = framed(hall())
    const nodes = new Map(frame.finding!.nodes.map((n) => [n.node, n]))
    const brace = frame.members.find((m) => m.member.id === 'D1')!
    const curve = deformedCurve(brace, nodes, frame.scale, 300)!
    const [middle, chord] = [pointOn(curve, 0.5), [0, 1].map((k) => (curve.from[k]! + curve.to[k]!) / 2)]
    expect(middle[0]).toBeCloseTo(chord[0]!, 9)
    expect(middle[1]).toBeCloseTo(chord[1]!, 9)
  })

  it('is exaggerated by a round factor, which is printed', () => {
    expect(factorFor([{ node: 'a', x_mm: 3, down_mm: 4, rotation_rad: 0 }], 10, 100)).toBe(200) // 12 mm wanted of 0.05 mm
    expect(factorFor([{ node: 'a', x_mm: 0, down_mm: 0, rotation_rad: 0 }], 10, 100)).toBe(1)
    const { findings } = framed(block)
    const scene = elevation({ building: block, line: 'A', findings, ...SHEET, factor: 60 })
    expect(textsOf(scene).map((t) => t.text)).toContain('deformed, \u00d7 60')
  })
})

describe('an elevation', () => {
  const { findings } = framed(block)
  const scene = elevation({ building: block, line: 'A', findings, ...SHEET })
  const shapes = flat(scene.primitives)

  it('colours each member by its status and marks the red and the amber with their shape', () => {
    const found = findings.frame_lines[0]!.members
    expect(new Set(found.map((m) => m.status)).size).toBeGreaterThan(1)
    for (const { member, status } of found) {
      const drawn = shapes.find((p) => p.id === `member/A/${member}`)
      expect(drawn?.role).toBe(`member-${status}`)
      const marks = shapes.filter((p) => p.shape === 'mark' && p.target?.kind === 'member' && p.target.id === member)
      const wanted = status === 'red' || status === 'amber' ? [`status-${status}`] : []
      expect(marks.map((m) => m.role)).toEqual(wanted)
    }
  })

  it('says every settlement with its interval and every distortion as 1/n under its bay', () => {
    const words = textsOf(scene).map((t) => t.text)
    expect(words).toEqual(expect.arrayContaining(['14.0', '\u00b1 0.7', '3.4', 'A4', '5.40', '+10.00', '\u00b10.00']))
    const spans = shapes.filter((p) => p.shape === 'text' && p.target?.kind === 'span')
    expect(spans).toHaveLength(3)
  })

  it('leaves out a member that is not there and draws the rest', () => {
    const without = structuredClone(block)
    without.frame_lines[0]!.members = without.frame_lines[0]!.members.filter((m) => m.id !== 'A1-A2/2')
    const lines = flat(elevation({ building: without, line: 'A', ...SHEET }).primitives).filter((p) =>
      p.id?.startsWith('member/'),
    )
    expect(lines).toHaveLength(block.frame_lines[0]!.members.length - 1)
  })

  it('says in words that a line has nothing to draw yet', () => {
    const bare: Building = { ...block, frame_lines: [{ id: 'N', nodes: [], members: [] }] }
    expect(elevation({ building: bare, line: 'N', ...SHEET }).title).toBe('Frame line N has no nodes yet')
    expect(() => elevation({ building: bare, line: 'M', ...SHEET })).toThrow(
      expect.objectContaining({ code: 'element.unknown' }),
    )
  })

  it('prints the figure that made the flag', () => {
    const member = { induced_fraction: 0.08, utilisation: 1.02 } as MemberFinding
    expect(flagWords(member, DEFAULT_CRITERIA)).toBe('102 % used')
    expect(flagWords({ ...member, induced_fraction: 0.31 }, DEFAULT_CRITERIA)).toBe('31 %')
  })

  it('writes levels as the trade does', () => {
    expect([3.6, -1.2, 0, -0.001].map(levelWords)).toEqual(['+3.60', '\u22121.20', '\u00b10.00', '\u00b10.00'])
  })
})
