/** What the window and the command line are given: plain data, no classes, ready for any wire. */
import type { Building, LevelBook, GivenLevel } from '../model/building.ts'
import type { FaultRecord } from '../model/faults.ts'
import type { Findings } from '../model/findings.ts'

export type RoundState = 'draft' | 'accepted' | 'superseded'

/** A round with its history. Accepted rounds are also in `ProjectView.building.survey.rounds`. */
export interface RoundView {
  id: string
  date: string
  state: RoundState
  levels?: GivenLevel[]
  book?: LevelBook
  observer?: string
  instrument?: string
  weather?: string
  note?: string
  accepted_at?: string
  accepted_by?: string
  /** Counted from 1; a correction is the next version of its round. */
  version: number
  /** Why this version replaced the one before. */
  reason?: string
}

export interface ProjectView {
  /** Where the project file is. */
  path: string
  /** The file may not be written to. */
  read_only: boolean
  /** The description and the accepted rounds in force. */
  building: Building
  /** All versions of all rounds, drafts included, by date. */
  rounds: RoundView[]
  /** Names of what undo and redo would do; null where there is nothing. */
  undo: string | null
  redo: string | null
  /** Counts every write; tells the window whether what it shows is current. */
  revision: number
}

export interface IssuedReportView {
  /** Running number, from 1. */
  number: number
  /** Number and revision as printed: "TR-014/3 rev A" or "3 rev A" without a reference. */
  label: string
  round: string
  issued_at: string
  surveyed_by: string
  assessed_by: string
  reviewer: string
  pages: number
  sha256: string
}

export interface ReportNames {
  surveyed_by: string
  assessed_by: string
  /** The licensed engineer who is to review and sign. */
  reviewer: string
}

export interface ReportOptions extends ReportNames {
  round: string
  paper: 'A4' | 'Letter'
}

export interface PdfView {
  /** Base64 of the PDF's bytes. */
  pdf: string
  pages: number
}

export type { VerifyRow } from '../model/verification.ts'

export interface ExportedView {
  written: string
  /** Rounds left out because they are not accepted yet. */
  drafts: string[]
  /** What is unfinished in the description: the file cannot be imported until it is mended. */
  unfinished: FaultRecord[]
}

export interface ImportedView {
  added: string[]
  /** How each column of a readings table was read. */
  columns?: Record<string, string>
  /** What was taken for granted, a sentence each. */
  notes?: string[]
}

export interface FolderView {
  folder: string
  parent: string | null
  folders: string[]
  /** Files in it of the kinds that are read or written: projects, building files, readings tables, reports. */
  files: string[]
}

export interface AboutView {
  version: string
  build: string
  /** Which shell asks. */
  shell: 'electron' | 'browser' | 'command line'
  home: string
  /** Project opened by the command line, where there is one. */
  opened: string | null
}

export type { Findings }
