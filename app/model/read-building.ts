/** A building file, from its text or bytes to a building or to the list of all its faults. */
import type { Building } from './building.ts'
import { checkBuilding, type CheckOptions } from './check-building.ts'
import { FaultsFound } from './check/faults-found.ts'
import { decodeText } from './decode-text.ts'
import { faultsOf, InputFault, type FaultRecord, type Place } from './faults.ts'
import { DEEPEST, parseJson, type JsonSlip } from './json-text.ts'

/** The building that the file describes. Throws an InputFault that lists all faults of the file. */
export function readBuilding(input: string | Uint8Array, file?: string, options?: CheckOptions): Building {
  const place: Place = file === undefined ? {} : { file }
  const text = textOf(input, file)
  const parsed = parseJson(text)
  if ('slip' in parsed) throw new InputFault([slipFault(parsed.slip, place)])
  const { value, repeated } = parsed.json
  const faults = new FaultsFound(file)
  for (const twice of repeated) faults.add('key.repeated', twice)
  try {
    const building = checkBuilding(value, file, options)
    if (faults.all.length === 0) return building
  } catch (error) {
    if (!(error instanceof InputFault)) throw error
    throw new InputFault([...faults.all, ...error.faults])
  }
  throw new InputFault(faults.all)
}

function textOf(input: string | Uint8Array, file?: string): string {
  try {
    return decodeText(input, file)
  } catch (error) {
    const faults = faultsOf(error)
    throw faults ? new InputFault(faults) : error
  }
}

function slipFault(slip: JsonSlip, place: Place): FaultRecord {
  const at: Place = { ...place, path: `line ${slip.line}, column ${slip.column}`, value: slip.found }
  const detail = { expected: slip.expected }
  if (slip.deep) return { code: 'file.deep', place: { ...at, detail: { most: DEEPEST } } }
  if (slip.cut) return { code: 'file.cut', place: { ...at, detail } }
  return { code: 'file.malformed', place: { ...at, detail: { ...detail, ...remedyOf(slip) } } }
}

/** The slips that people make most when they write JSON by hand. */
function remedyOf({ expected, found }: JsonSlip): { remedy?: string } {
  if (/key/.test(expected) && /^\d/.test(found))
    return { remedy: 'Write decimals with a point, and the key that follows in double quotes.' }
  if (/key|value/.test(expected) && /^[}\]]/.test(found)) return { remedy: 'Take the comma before it out.' }
  if (found.startsWith('/')) return { remedy: 'Take the comment out; JSON has none.' }
  if (found.startsWith("'")) return { remedy: 'Write double quotes.' }
  return {}
}
