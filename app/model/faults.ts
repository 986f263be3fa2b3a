/**
 * Expected faults as data: a code, a place, and words made last from one catalogue. Anything thrown that is
 * not a Fault or an InputFault is a bug of the program. Across a boundary faults travel as `{ code, place }`.
 */
import { catalogue, type FaultCode, type FaultMessage } from './fault-messages.ts'

export type { FaultCode } from './fault-messages.ts'

/** Something in the building that a fault can stand beside in the window. */
export interface ElementRef {
  kind: 'building' | 'support' | 'section' | 'line' | 'node' | 'member' | 'point' | 'round' | 'row' | 'criteria'
  id: string
  /** Frame line of a node or member; round of a row. */
  within?: string
}

export interface Place {
  /** File name as the user gave it. */
  file?: string
  /** Path inside the file, as `sections[2].E_GPa`; or `row 12` of a table. */
  path?: string
  value?: unknown
  element?: ElementRef
  /** Whatever else the sentence needs: the nearest right key, a limit, the names of nodes. */
  detail?: Record<string, string | number | readonly string[]>
}

/** A fault as it crosses a boundary. */
export interface FaultRecord {
  code: FaultCode
  place: Place
}

export interface FaultWords {
  /** What is wrong. */
  what: string
  /** What was kept or left untouched. */
  kept: string
  /** What to do. */
  todo: string
}

/** The sentences of a fault. */
export function words(record: FaultRecord): FaultWords {
  const message: FaultMessage = catalogue[record.code]
  return { what: message.what(record.place), kept: message.kept, todo: message.todo(record.place) }
}

/** One expected fault. */
export class Fault extends Error {
  readonly code: FaultCode
  readonly place: Place

  constructor(code: FaultCode, place: Place = {}, options?: ErrorOptions) {
    super(words({ code, place }).what, options)
    this.name = 'Fault'
    this.code = code
    this.place = place
  }

  get record(): FaultRecord {
    return { code: this.code, place: this.place }
  }
}

/** All the faults of one input, thrown together so that they can be mended together. */
export class InputFault extends Error {
  readonly faults: readonly FaultRecord[]

  constructor(faults: readonly FaultRecord[]) {
    super(faults.map((f) => words(f).what).join('\n'))
    this.name = 'InputFault'
    this.faults = faults
  }
}

/** The faults that an error stands for; undefined for a bug. */
export function faultsOf(error: unknown): readonly FaultRecord[] | undefined {
  if (error instanceof InputFault) return error.faults
  if (error instanceof Fault) return [error.record]
  return undefined
}
