/**
 * What a use case may ask for. `db` and the shells implement these from outside; use cases know no SQLite, no
 * file system, no clock and no PDF library.
 */
import type { Building, GivenCriteria, Round } from '../model/building.ts'
import type { Change, Edit } from '../model/changes.ts'
import type { FolderView, IssuedReportView, ReportOptions, RoundView, VerifyRow } from '../contract/views.ts'
import type { Stop } from '../contract/wire.ts'
import type { Findings } from '../model/findings.ts'

/** A round as it is booked or pasted, before acceptance. */
export interface DraftRound extends Round {
  observer?: string
  instrument?: string
  weather?: string
  note?: string
}

/** Reads of an open project. */
export interface ReadStore {
  readonly path: string
  readonly readOnly: boolean
  building(): Building
  rounds(): RoundView[]
  undoName(): string | null
  redoName(): string | null
  revision(): number
  register(): IssuedReportView[]
  pdf(number: number): Uint8Array | undefined
  /** Findings kept for the hash of their input. */
  keptFindings(hash: string): Findings | undefined
}

/** Writes; only handed out inside a transaction. */
export interface WriteStore extends ReadStore {
  /** Applies the changes, keeps the edit and its reverse, forgets what could be redone. */
  edit(edit: Edit, who: string, when: string): void
  /** Takes the last edit back; returns its name, or null where there is none. */
  undo(who: string, when: string): string | null
  redo(who: string, when: string): string | null
  /** Puts a draft in place of the draft of that id, or adds it. */
  putDraft(draft: DraftRound, when: string): void
  dropDraft(id: string): void
  /** Freezes the draft's readings. */
  accept(id: string, who: string, when: string, note?: string): void
  /** Adds a new accepted version of an accepted round and marks the old one superseded. */
  correct(round: DraftRound, reason: string, who: string, when: string): void
  setBaseline(id: string, reason: string, who: string, when: string): void
  keepFindings(hash: string, findings: Findings): void
  /** Issued PDFs are never changed. */
  issue(report: IssuedReportView, pdf: Uint8Array, who: string): void
}

/** Opens, makes and copies project files. */
export interface Projects {
  create(path: string, building: Building, rounds: readonly DraftRound[], who: string, when: string): void
  open(path: string): OpenProject
  duplicate(from: OpenProject, path: string): void
}

export interface OpenProject {
  readonly path: string
  read: ReadStore
  /** Runs the function in one immediate transaction; whatever it throws rolls all of it back. */
  write<T>(run: (store: WriteStore) => T): T
  close(): void
}

export interface Files {
  home(): string
  list(folder: string): FolderView
  exists(path: string): boolean
  readBytes(path: string): Uint8Array
  /** Writes beside the target first and renames, so that half a file never stands under the name. Text is UTF-8. */
  writeBytes(path: string, bytes: Uint8Array | string): void
}

export interface Clock {
  /** ISO 8601 with seconds, UTC. */
  now(): string
  who(): string
}

export interface Printer {
  print(
    building: Building,
    options: ReportOptions & {
      label: string
      status: 'draft' | 'issued'
      date: string
      verification: readonly VerifyRow[]
    },
    signal: Stop,
  ): Promise<{ pdf: Uint8Array; pages: number }>
}

export interface Hasher {
  sha256(bytes: Uint8Array | string): string
}

/** What a handler is given beside its input. */
export interface Context {
  projects: Projects
  files: Files
  clock: Clock
  printer: Printer
  hasher: Hasher
  session: Session
  signal: Stop
  progress(done: number, of: number, what: string): void
  about: { version: string; build: string; shell: 'electron' | 'browser' | 'command line' }
}

/** The project that this window or command has open. */
export interface Session {
  project: OpenProject | null
}

export type { Change, GivenCriteria }
