/** Projects in a folder of their own that is gone after the test. For tests. */
import { cpSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { onTestFinished } from 'vitest'
import { projects } from '../../db/projects.ts'
import type { Building } from '../../app/model/building.ts'
import { faultsOf, type FaultRecord } from '../../app/model/faults.ts'
import type { OpenProject } from '../../app/usecases/ports.ts'
import { smallBuilding } from './made.ts'

export const WHEN = '2026-05-04T08:30:00Z'
export const WHO = 'T. Tester'

/** A path in a new folder. */
export function temporary(name = 'store.levelstead'): string {
  const folder = mkdtempSync(join(tmpdir(), 'levelstead-test-'))
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }))
  return join(folder, name)
}

/** A copy of a file in a new folder. */
export function copied(file: string, name?: string): string {
  const path = temporary(name)
  cpSync(file, path)
  return path
}

/** A project file of that building, made and closed. */
export function madeProject(building: Building = smallBuilding(), when = WHEN): string {
  const path = temporary()
  projects(() => when).create(path, building, building.survey.rounds, WHO, when)
  return path
}

/** A project, open until the test ends. */
export function opened(path: string, now = WHEN, patience_ms?: number): OpenProject {
  const project = projects(() => now, patience_ms).open(path)
  onTestFinished(() => project.close())
  return project
}

/** The faults that a function throws; what else it throws goes on, and none is an error of the test. */
export function faultsBy(run: () => unknown): readonly FaultRecord[] {
  try {
    run()
  } catch (error) {
    const faults = faultsOf(error)
    if (faults) return faults
    throw error
  }
  throw new Error('There was no fault.')
}

export function codesBy(run: () => unknown): string[] {
  return faultsBy(run).map((fault) => fault.code)
}
