import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { plan } from '../../app/drawing/plan.ts'
import { contours } from '../../app/drawing/plan/contours.ts'
import { triangulate } from '../../app/drawing/plan/delaunay.ts'
import { bearing, tiltWords } from '../../app/drawing/plan/footer.ts'
import type { Point } from '../../app/drawing/scene.ts'
import { flat, settledGrid, textsOf } from '../support/drawn.ts'

const places = fc.uniqueArray(fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: 0, max: 40 })), {
  minLength: 3,
  maxLength: 25,
  selector: ([x, y]) => `${x},${y}`,
})

function area([a, b, c]: readonly Point[]): number {
  return ((b![0] - a![0]) * (c![1] - a![1]) - (b![1] - a![1]) * (c![0] - a![0])) / 2
}

describe('triangles between supports', () => {
  it('have no support inside the circle through their corners (Delaunay 1934)', () => {
    fc.assert(
      fc.property(places, (points) => {
        for (const t of triangulate(points)) {
          const [a, b, c] = t.map((k) => points[k]!) as unknown as [Point, Point, Point]
          for (const p of points) {
            const rows = [a, b, c].map(([x, y]) => [x - p[0], y - p[1], (x - p[0]) ** 2 + (y - p[1]) ** 2] as const)
            const [r, s, u] = rows as [(typeof rows)[0], (typeof rows)[0], (typeof rows)[0]]
            const inside =
              r[0] * (s[1] * u[2] - s[2] * u[1]) -
              r[1] * (s[0] * u[2] - s[2] * u[0]) +
              r[2] * (s[0] * u[1] - s[1] * u[0])
            expect(Math.sign(area([a, b, c])) * inside).toBeLessThanOrEqual(1e-6)
          }
        }
      }),
      { numRuns: 100 },
    )
  })

  it('cover a grid without gap or overlap', () => {
    const grid = [0, 6, 11.4, 17.4].flatMap((x) => [0, 5.6, 11.2].map((y): Point => [x, y]))
    const covered = triangulate(grid).reduce((sum, t) => sum + Math.abs(area(t.map((k) => grid[k]!))), 0)
    expect(covered).toBeCloseTo(17.4 * 11.2, 9)
  })

  it('are none where all supports stand in one line', () => {
    expect(triangulate([0, 3, 7, 12].map((x): Point => [x, 2 * x]))).toEqual([])
    expect(triangulate([[1, 1]])).toEqual([])
  })
})

describe('contours of settlement', () => {
  it('of a plane are straight and stand where the plane has their value', () => {
    const samples = [0, 6, 12, 18].flatMap((x) =>
      [0, 5, 10].map((y) => ({ at: [x, y] as Point, value: 1 + 0.3 * x - 0.1 * y })),
    )
    const lines = contours(samples, 1)
    expect(new Set(lines.map((l) => l.value))).toEqual(new Set([1, 2, 3, 4, 5, 6]))
    for (const { value, points } of lines)
      for (const [x, y] of points) expect(1 + 0.3 * x - 0.1 * y).toBeCloseTo(value, 9)
  })

  it('do not take sides between the diagonals of a rectangle', () => {
    const at = [
      [0, 0],
      [6, 0],
      [6, 4],
      [0, 4],
    ] as Point[]
    function mirrored(values: number[]) {
      return contours(
        at.map((p, i) => ({ at: p, value: values[i]! })),
        1,
      )
    }
    const upright = mirrored([0, 0, 4, 0])
      .flatMap((c) => c.points)
      .map(([x, y]) => [6 - x, y])
    const flipped = mirrored([0, 0, 0, 4]).flatMap((c) => c.points)
    for (const [x, y] of flipped) expect(upright.some(([u, v]) => Math.hypot(u! - x, v! - y) < 1e-9)).toBe(true)
  })
})

describe('a plan', () => {
  const building = settledGrid([6, 6, 6], [5, 5], [3.5], [0, 1, 2, 4, 0, 1, NaN, 4, 0, 1, 2, -1])
  const findings = assessBuilding(building, 'R1').rounds[0]!
  const scene = plan({ building, findings, width: 200, height: 140 })
  const discs = flat(scene.primitives).filter((p) => p.shape === 'circle' && p.role.startsWith('settlement'))

  it('gives each support a disc whose area goes by its settlement', () => {
    function radius(id: string) {
      const disc = discs.find((p) => p.target?.kind === 'support' && p.target.id === id)
      return disc?.shape === 'circle' ? disc.radius : NaN
    }
    expect(discs).toHaveLength(12)
    expect(radius('A4') ** 2 / radius('A3') ** 2).toBeCloseTo(2, 6)
  })

  it('tells the support that was not read and the one that has risen from the rest', () => {
    const roles = new Map(discs.map((p) => [p.target?.kind === 'support' ? p.target.id : '', p.role]))
    expect([roles.get('B3'), roles.get('C4'), roles.get('A4')]).toEqual([
      'settlement-estimated',
      'settlement-rise',
      'settlement-disc',
    ])
    const words = textsOf(scene).map((t) => t.text)
    expect(words.some((w) => w.startsWith('\u2248 '))).toBe(true)
    expect(words).toContain('\u22121.0')
    expect(words).toContain('\u2248 estimated, not measured')
  })

  it('points the tilt to where the building goes down', () => {
    expect(bearing({ x_rad: 1e-3, y_rad: 0, mean_mm: 0 })).toBe('90')
    expect(bearing({ x_rad: 0, y_rad: -1e-3, mean_mm: 0 })).toBe('180')
    expect(bearing({ x_rad: -1e-3, y_rad: 1e-3, mean_mm: 0 })).toBe('315')
    const [full] = tiltWords({ x_rad: 3e-4, y_rad: 4e-4, mean_mm: 0, sd_x_rad: 1e-5, sd_y_rad: 1e-5 }, 1.96)
    expect(full).toBe('tilt 1/2000, down towards 37\u00b0 from +y')
  })

  it('says so where a tilt is within the measuring noise', () => {
    const [full] = tiltWords({ x_rad: 1e-5, y_rad: 0, mean_mm: 0, sd_x_rad: 2e-5, sd_y_rad: 2e-5 }, 1.96)
    expect(full).toBe('no tilt beyond the measuring noise')
  })

  it('without supports says that there are none yet', () => {
    expect(plan({ building: { ...building, supports: [], frame_lines: [] }, width: 100, height: 80 }).title).toBe(
      'No supports yet',
    )
  })
})
