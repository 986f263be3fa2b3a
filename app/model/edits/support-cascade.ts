/**
 * What follows for the rest of the building when supports move or go: frame lines are measured again, bays and
 * columns that stood on a lost support go with it, its studs as well. A stud that was read stays what it is,
 * because readings are never lost: its support cannot be taken away.
 */
import type { Building, FrameLine, Support } from '../building.ts'
import { Fault } from '../faults.ts'
import {
  axesOf,
  baseDepths,
  distancesAlong,
  near,
  roundLength,
  supportsByName,
  without,
  withoutLooseNodes,
} from './frame-grid.ts'
import { roundsReading } from './refs.ts'

/** The building without these supports. Throws where one carries a stud that was read. */
export function withoutSupports(building: Building, ids: readonly string[]): Building {
  if (ids.length === 0) return building
  const gone = new Set(ids)
  for (const point of building.survey.points) {
    if (point.kind !== 'stud' || !gone.has(point.support)) continue
    const rounds = roundsReading(building, point.id)
    if (rounds.length) {
      throw new Fault('support.read', {
        element: { kind: 'support', id: point.support },
        value: point.support,
        detail: { point: point.id, rounds },
      })
    }
  }
  return {
    ...building,
    supports: building.supports.filter((support) => !gone.has(support.id)),
    frame_lines: building.frame_lines.flatMap((line) => withoutAxes(line, gone)),
    survey: {
      ...building.survey,
      points: building.survey.points.filter((point) => point.kind !== 'stud' || !gone.has(point.support)),
    },
  }
}

/**
 * A support at the end of a line takes its whole axis with it, one within the line its lowest column only: the
 * floors above then span on. A line left with fewer than two supports goes.
 */
function withoutAxes(line: FrameLine, gone: ReadonlySet<string>): FrameLine[] {
  const axes = axesOf(line)
  if (!axes.some((axis) => gone.has(axis.support))) return [line]
  const left = axes.filter((axis) => !gone.has(axis.support))
  if (left.length < 2) return []
  const [first, last] = [left[0]!.x_m, left[left.length - 1]!.x_m]
  const cut = without(line, (node) => {
    if (node.support !== undefined && gone.has(node.support)) return true
    return axes.some(
      (axis) => gone.has(axis.support) && near(axis.x_m, node.x_m) && (axis.x_m < first || axis.x_m > last),
    )
  })
  return [withoutLooseNodes(cut)]
}

/**
 * The building with its supports put as given. Frame lines whose axes stood where the plan said are measured
 * again, nodes between two axes keep their share of the bay; a line described otherwise is left as it is.
 */
export function withMovedSupports(building: Building, supports: readonly Support[]): Building {
  const before = supportsByName(building)
  const after = new Map(supports.map((support) => [support.id, support]))
  return {
    ...building,
    supports: [...supports],
    frame_lines: building.frame_lines.map((line) => measuredAgain(line, before, after)),
  }
}

function measuredAgain(
  line: FrameLine,
  before: ReadonlyMap<string, Support>,
  after: ReadonlyMap<string, Support>,
): FrameLine {
  const axes = axesOf(line)
  const old = axes.flatMap((axis) => before.get(axis.support) ?? [])
  const now = axes.flatMap((axis) => after.get(axis.support) ?? [])
  const start = axes[0]?.x_m ?? 0
  if (old.length !== axes.length || now.length !== axes.length || axes.length === 0) return line

  const was = distancesAlong(old)
  const x = distancesAlong(now)
  const follows = axes.every((axis, i) => near(axis.x_m - start, was[i]!))
  const moves = follows && x.some((along, i) => !near(along, was[i]!))
  const depths = baseDepths(now)
  const sinks = axes.every((axis, i) => near(axis.base.z_m, baseDepths(old)[i]!))
  if (!moves && !(sinks && axes.some((axis, i) => !near(axis.base.z_m, depths[i]!)))) return line
  return {
    ...line,
    nodes: line.nodes.map((node) => {
      const axis = axes.findIndex((a) => a.base.id === node.id)
      const x_m = moves ? roundLength(start + carried(node.x_m - start, was, x)) : node.x_m
      return axis >= 0 && sinks ? { ...node, x_m, z_m: depths[axis]! } : { ...node, x_m }
    }),
  }
}

/** Where a place between the old axes lies between the new ones. */
function carried(place: number, was: readonly number[], now: readonly number[]): number {
  let i = was.findIndex((along) => near(along, place))
  if (i >= 0) return now[i]!
  i = was.findIndex((along) => along > place)
  if (i === 0) return now[0]! + place - was[0]!
  if (i < 0) return now[now.length - 1]! + place - was[was.length - 1]!
  const share = (place - was[i - 1]!) / (was[i]! - was[i - 1]!)
  return now[i - 1]! + share * (now[i]! - now[i - 1]!)
}
