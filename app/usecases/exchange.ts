/** Building files and readings tables in and out. Nothing is written where anything of what comes in is at fault. */
import { prepare } from '../assess/prepare.ts'
import type { ExportedView, ImportedView, ProjectView } from '../contract/views.ts'
import type { Building, Round } from '../model/building.ts'
import { Fault, faultsOf, InputFault, type FaultRecord } from '../model/faults.ts'
import { readBuilding } from '../model/read-building.ts'
import { readReadings } from '../model/read-readings.ts'
import { writeBuilding } from '../model/write-building.ts'
import { writeReadings } from '../model/write-readings.ts'
import type { Context, ReadStore, WriteStore } from './ports.ts'
import { open } from './project.ts'
import { openProject } from './project-view.ts'
import { addRound, refuseUnlevelled } from './rounds.ts'
import { writeBuildingFile, writeNew } from './write-new.ts'

/** A building file as a building whose frames can be solved. Throws an InputFault that names the file. */
export function soundBuilding(bytes: Uint8Array, file: string): Building {
  const building = readBuilding(bytes, file)
  try {
    prepare(building)
  } catch (error) {
    const faults = faultsOf(error)
    if (!faults) throw error
    throw new InputFault(
      faults.map(({ code, place }) => ({ code, place: { file, ...pathOf(building, place), ...place } })),
    )
  }
  return building
}

/** Where in the file a fault of a frame line stands. */
function pathOf(building: Building, place: { element?: { id: string; kind: string }; value?: unknown }) {
  const { element } = place
  const index = element?.kind === 'line' ? building.frame_lines.findIndex((line) => line.id === element.id) : -1
  return index < 0 ? {} : { path: `frame_lines[${index}]`, value: place.value ?? element!.id }
}

export function importBuilding({ from, to }: { from: string; to: string }, context: Context): ProjectView {
  const building = soundBuilding(context.files.readBytes(from), from)
  context.progress(1, 2, 'The building file is read')
  context.projects.create(to, building, building.survey.rounds, context.clock.who(), context.clock.now())
  return open({ path: to }, context)
}

/** A building file holds nothing that its project has not: one that was asked for by name may be written again. */
export function exportBuilding({ to, replace }: { to: string; replace?: boolean }, context: Context): ExportedView {
  const { read } = openProject(context)
  const text = writeBuilding(read.building())
  if (replace) writeBuildingFile(context, to, text)
  else writeNew(context, to, text)
  const drafts = read.rounds().flatMap((r) => (r.state === 'draft' ? [r.id] : []))
  return { written: to, drafts, unfinished: unfinishedIn(text) }
}

/**
 * The accepted rounds as readings tables. Level books and given levels have columns of their own: where the project has
 * both, the levels go to a second table beside the first.
 */
export function exportReadings({ to }: { to: string }, context: Context): { written: string[] } {
  const { levels, books } = writeReadings(openProject(context).read.building().survey.rounds)
  if (levels === undefined && books === undefined) throw new Fault('rounds.none')
  const beside = to.replace(/(\.[^./\\]*)?$/, ', levels$1')
  const tables: [string, string][] = []
  if (books !== undefined) tables.push([to, books])
  if (levels !== undefined) tables.push([books === undefined ? to : beside, levels])
  for (const [path] of tables) if (context.files.exists(path)) throw new Fault('file.exists', { file: path })
  // With a mark of its encoding, as spreadsheets want it.
  for (const [path, text] of tables) writeNew(context, path, `\ufeff${text}`)
  return { written: tables.map(([path]) => path) }
}

function unfinishedIn(text: string): FaultRecord[] {
  try {
    prepare(readBuilding(text))
    return []
  } catch (error) {
    const faults = faultsOf(error)
    if (!faults) throw error
    return [...faults]
  }
}

export function logReadings({ from }: { from: string }, context: Context, store: WriteStore): ImportedView {
  const { rounds, columns, notes } = readReadings(context.files.readBytes(from), store.building(), from)
  const faults = rounds.flatMap((round) => faultsOfLogged(round, store, from))
  if (faults.length) throw new InputFault(faults)
  for (const round of rounds) addRound(store, round, context.clock.who(), context.clock.now())
  return { added: rounds.map((r) => r.id), columns, notes }
}

/** What stands against a round of a table besides its form: a draft of its name, readings that give no levels. */
function faultsOfLogged(round: Round, store: ReadStore, file: string): FaultRecord[] {
  try {
    const element = { kind: 'round', id: round.id } as const
    if (store.rounds().some((r) => r.id === round.id)) throw new Fault('draft.present', { value: round.id, element })
    refuseUnlevelled(round, store.building())
    return []
  } catch (error) {
    const faults = faultsOf(error)
    if (!faults) throw error
    return faults.map(({ code, place }) => ({ code, place: { file, path: `round ${round.id}`, ...place } }))
  }
}
