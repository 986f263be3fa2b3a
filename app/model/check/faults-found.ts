/** The faults of one input as they are found, each with its place. */
import type { FaultCode, FaultRecord, Place } from '../faults.ts'
import { nearest } from '../nearest.ts'

/** A file in which every name is wrong is not worth a search of all names for each. */
const MOST_SEARCHES = 200

export class FaultsFound {
  readonly all: FaultRecord[] = []
  private readonly file: string | undefined
  private searches = 0

  constructor(file?: string) {
    this.file = file
  }

  add(code: FaultCode, place: Place): void {
    const { value, ...rest } = place
    const where = this.file === undefined ? rest : { file: this.file, ...rest }
    this.all.push({ code, place: 'value' in place ? { ...where, value: shortened(value) } : where })
  }

  /** The nearest right word as detail of a fault. */
  nearest(word: unknown, candidates: Iterable<string>): { nearest?: string } {
    if (typeof word !== 'string' || ++this.searches > MOST_SEARCHES) return {}
    const found = nearest(word, candidates)
    return found === undefined ? {} : { nearest: found }
  }
}

const LONGEST = 200

/** A place crosses boundaries and stands in one line: it holds no whole part of a file. */
function shortened(value: unknown): unknown {
  if (typeof value !== 'object' || value === null || JSON.stringify(value).length <= LONGEST) return value
  return Array.isArray(value) ? `a list of ${value.length}` : 'an object'
}
