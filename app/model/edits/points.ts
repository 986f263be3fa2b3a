/** Levelling studs and benchmarks. A point that was read keeps its name and stays, because readings are never lost. */
import type { Building, Stud, SurveyPoint } from '../building.ts'
import type { Edit } from '../changes.ts'
import { Fault } from '../faults.ts'
import { editOf, filled } from './difference.ts'
import { unused } from './frame-grid.ts'
import { freeName, roundsReading } from './refs.ts'

/** The supports that carry no stud. */
export function supportsWithoutStud(building: Building): string[] {
  const carried = new Set(building.survey.points.flatMap((p) => (p.kind === 'stud' ? [p.support] : [])))
  return building.supports.filter((support) => !carried.has(support.id)).map((support) => support.id)
}

/** Places a stud, `S-A1`, at every support that has none. */
export function placeStuds(building: Building): Edit {
  const bare = supportsWithoutStud(building)
  const points = [...building.survey.points]
  for (const support of bare) points.push({ id: unused(`S-${support}`, points), kind: 'stud', support })
  return editOf(
    bare.length === 1 ? `Place a stud at ${bare[0]}` : `Place ${bare.length} studs`,
    building,
    withPoints(building, points),
  )
}

export function addStud(building: Building, stud: Omit<Stud, 'kind'>): Edit {
  const id = freeName({ kind: 'point', id: stud.id }, building.survey.points)
  const points: SurveyPoint[] = [...building.survey.points, { id, kind: 'stud', support: stud.support }]
  return editOf(`Place stud ${id}`, building, withPoints(building, points))
}

export function addBenchmark(building: Building, benchmark: { id: string; level_m: number }): Edit {
  const id = freeName({ kind: 'point', id: benchmark.id }, building.survey.points)
  const points: SurveyPoint[] = [...building.survey.points, { id, kind: 'benchmark', level_m: benchmark.level_m }]
  return editOf(`Add benchmark ${id}`, building, withPoints(building, points))
}

export function setBenchmarkLevel(building: Building, id: string, level_m: number): Edit {
  const points = building.survey.points.map((p) => (p.id === id && p.kind === 'benchmark' ? { ...p, level_m } : p))
  return editOf(`Set level of ${id}`, building, withPoints(building, points))
}

/** Lets a benchmark go, with the reason, or holds it again where the reason is empty. */
export function setReleased(building: Building, id: string, reason: string): Edit {
  const released = reason.trim() === '' ? undefined : reason.trim()
  const points = building.survey.points.map((p) =>
    p.id === id && p.kind === 'benchmark' ? filled({ ...p, released }) : p,
  )
  return editOf(
    released === undefined ? `Hold ${id} again` : `Let ${id} go: ${released}`,
    building,
    withPoints(building, points),
  )
}

export function renamePoint(building: Building, id: string, name: string): Edit {
  const others = building.survey.points.filter((point) => point.id !== id)
  const next = freeName({ kind: 'point', id: name }, others)
  refuseIfRead(building, id)
  const points = building.survey.points.map((point) => (point.id === id ? { ...point, id: next } : point))
  return editOf(`Rename ${id} to ${next}`, building, withPoints(building, points))
}

export function removePoint(building: Building, id: string): Edit {
  refuseIfRead(building, id)
  const points = building.survey.points.filter((point) => point.id !== id)
  return editOf(`Remove ${id}`, building, withPoints(building, points))
}

function withPoints(building: Building, points: SurveyPoint[]): Building {
  return { ...building, survey: { ...building.survey, points } }
}

function refuseIfRead(building: Building, id: string): void {
  const rounds = roundsReading(building, id)
  if (rounds.length) throw new Fault('point.read', { element: { kind: 'point', id }, value: id, detail: { rounds } })
}
