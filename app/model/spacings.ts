/**
 * Spacings and storey heights as they are typed: `4 x 6.0, 5.4` is four bays of 6 m and one of 5.4 m. Commas
 * separate where decimals have a point; semicolons always do, and leave the comma free for decimals.
 */
import { InputFault, type FaultRecord } from './faults.ts'
import { parseNumber } from './numbers.ts'

const MOST = 200
const LONGEST_M = 1000

const PART = /^(?:(?<count>\d{1,6})\s*[x×*]\s*)?(?<length>.*)$/isu

/** The lengths in m, in order. Throws an InputFault that lists all faults of the text. */
export function parseSpacings(text: string): number[] {
  const hasOwnSeparator = /[;\n\t]/.test(text)
  // `6,5` is one length to one engineer and two to another.
  if (!hasOwnSeparator && /\d,\d/.test(text) && !text.includes('.'))
    throw new InputFault([{ code: 'spacings.ambiguous', place: { value: text.trim() } }])
  const faults: FaultRecord[] = []
  const lengths: number[] = []
  for (const part of text.split(hasOwnSeparator ? /[;\n\t]/ : ',')) {
    if (part.trim() === '') continue
    const { count, length } = PART.exec(part.trim())!.groups!
    const times = count === undefined ? 1 : Number(count)
    const parsed = parseNumber(length!, part.includes(',') ? ',' : '.')
    if (!parsed.ok || times === 0) faults.push({ code: 'spacings.malformed', place: { value: part.trim() } })
    else if (!(parsed.value > 0 && parsed.value <= LONGEST_M))
      faults.push({ code: 'spacings.unusable', place: { value: parsed.value } })
    else if (lengths.length + times > MOST)
      faults.push({ code: 'spacings.many', place: { value: lengths.length + times, detail: { most: MOST } } })
    else for (let i = 0; i < times; i++) lengths.push(parsed.value)
  }
  if (faults.length > 0) throw new InputFault(faults)
  return lengths
}

/** The lengths as they would be typed, equal neighbours taken together. */
export function spacingsText(lengths: readonly number[]): string {
  const runs: { length: number; count: number }[] = []
  for (const length of lengths) {
    const last = runs.at(-1)
    if (last?.length === length) last.count += 1
    else runs.push({ length, count: 1 })
  }
  return runs.map(({ length, count }) => (count === 1 ? String(length) : `${count} x ${length}`)).join(', ')
}
