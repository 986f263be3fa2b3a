/**
 * A building file as an open project that lives in memory: the command line asks the same requests of a building
 * file as of a project, and gets the same answers. It cannot be written to.
 */
import type { RoundView } from '../contract/views.ts'
import type { Building } from '../model/building.ts'
import { Fault } from '../model/faults.ts'
import type { Findings } from '../model/findings.ts'
import type { OpenProject, ReadStore, WriteStore } from '../usecases/ports.ts'

export function buildingProject(path: string, building: Building): OpenProject {
  const kept = new Map<string, Findings>()
  const read: ReadStore = {
    path,
    readOnly: true,
    building: () => building,
    rounds: () => building.survey.rounds.map((round): RoundView => ({ ...round, state: 'accepted', version: 1 })),
    undoName: () => null,
    redoName: () => null,
    revision: () => 0,
    register: () => [],
    pdf: () => undefined,
    keptFindings: (hash) => kept.get(hash),
  }
  function refuse(): never {
    throw new Fault('project.readonly', { file: path })
  }
  const store: WriteStore = {
    ...read,
    edit: refuse,
    undo: refuse,
    redo: refuse,
    putDraft: refuse,
    dropDraft: refuse,
    accept: refuse,
    correct: refuse,
    setBaseline: refuse,
    keepFindings: (hash, findings) => void kept.set(hash, findings),
    issue: refuse,
  }
  return { path, read, write: (run) => run(store), close: () => undefined }
}
