/** A fault as one line of text, for the screen of a terminal and for logs. */
import { words, type FaultRecord } from './faults.ts'
import { shown } from './fault-words.ts'

/** `error: FILE: PATH: value VALUE: what is wrong; what to do`, always in one line. */
export function errorLine(record: FaultRecord, file?: string): string {
  const { place } = record
  const { what, todo } = words(record)
  const name = place.file ?? file
  const parts = ['error']
  if (name !== undefined) parts.push(name)
  if (place.path !== undefined && place.path !== '') parts.push(place.path)
  if (place.path !== undefined) parts.push(`value ${place.value === undefined ? 'missing' : shown(place.value)}`)
  const plain = place.path && what.startsWith(`${place.path}: `) ? what.slice(place.path.length + 2) : what
  const told = `${parts.join(': ')}: ${plain.replace(/\.$/, '')}; ${todo}`
  // What a file holds must not break the line or steer the terminal.
  return told.replace(/[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g, ' ')
}
