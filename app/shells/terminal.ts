/** Standard output and error as the command line uses them: results to one, everything else to the other. */
import { writeSync } from 'node:fs'
import { errorLine } from '../model/fault-line.ts'
import type { FaultRecord } from '../model/faults.ts'

/** Writes all of it before going on; a reader that has gone away (`| head`) is no fault of anybody. */
function writeAll(handle: number, text: string): void {
  const bytes = Buffer.from(text)
  for (let done = 0; done < bytes.length;) {
    try {
      done += writeSync(handle, bytes, done)
    } catch (error) {
      const code = (error as NodeJS.ErrnoException).code
      if (code === 'EPIPE') return
      if (code !== 'EAGAIN') throw error
    }
  }
}

export function print(text: string): void {
  writeAll(1, text.endsWith('\n') ? text : `${text}\n`)
}

export function tell(text: string): void {
  writeAll(2, text.endsWith('\n') ? text : `${text}\n`)
}

/** One line a fault. Many faults of one kind are many lines: each names its own place. */
export function tellFaults(faults: readonly FaultRecord[], file?: string): void {
  tell(faults.map((fault) => errorLine(fault, file)).join('\n'))
}
