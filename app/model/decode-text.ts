/**
 * Bytes of a file as text: UTF-8, or UTF-16 as spreadsheets save it. Written out here because the pure layers
 * know neither the DOM nor Node. What is no text is a fault; nothing is ever replaced by a question mark.
 */
import { Fault, type Place } from './faults.ts'

/** The largest text that is read; a building of a thousand rounds is some 10 MB. */
const MOST_BYTES = 128 * 1024 * 1024
const STRIDE = 8192

export interface DecodeOptions {
  /** Text that is not UTF-8 is read as Windows-1252, as spreadsheets save tables. */
  windows1252?: boolean
}

/** The text of a file. Throws a Fault where it is empty, too large, or not text. */
export function decodeText(input: string | Uint8Array, file?: string, options: DecodeOptions = {}): string {
  const place: Place = file === undefined ? {} : { file }
  if (input.length > MOST_BYTES)
    throw new Fault('file.large', { ...place, value: input.length, detail: { most: MOST_BYTES } })
  const text = typeof input === 'string' ? input : textOf(input, place, options)
  const clean = text.charCodeAt(0) === 0xfeff ? text.slice(1) : text
  if (clean.trim() === '') throw new Fault('file.empty', place)
  if (clean.includes('\0')) throw new Fault('file.binary', place)
  return clean
}

function textOf(bytes: Uint8Array, place: Place, { windows1252 = false }: DecodeOptions): string {
  const [a, b, c, d] = bytes
  if (startsWith(bytes, 'SQLite format 3\0')) throw new Fault('file.project', place)
  if (a === 0xff && b === 0xfe && !(c === 0 && d === 0)) return utf16(bytes.subarray(2), true, place)
  if (a === 0xfe && b === 0xff) return utf16(bytes.subarray(2), false, place)
  if (a !== 0 && b === 0 && c !== 0 && d === 0) return utf16(bytes, true, place)
  if (a === 0 && b !== 0 && c === 0 && d !== 0) return utf16(bytes, false, place)
  try {
    return utf8(bytes, place)
  } catch (error) {
    if (windows1252 && error instanceof Fault && error.code === 'file.garbled') return fromWindows1252(bytes, place)
    throw error
  }
}

function startsWith(bytes: Uint8Array, head: string): boolean {
  return bytes.length >= head.length && [...head].every((sign, i) => bytes[i] === sign.charCodeAt(0))
}

function utf16(bytes: Uint8Array, littleEnd: boolean, place: Place): string {
  if (bytes.length % 2) throw new Fault('file.garbled', { ...place, detail: { byte: bytes.length, wanted: 'UTF-16' } })
  const parts: string[] = []
  for (let start = 0; start < bytes.length; start += STRIDE) {
    const units: number[] = []
    for (let i = start; i < Math.min(start + STRIDE, bytes.length); i += 2)
      units.push(littleEnd ? bytes[i]! | (bytes[i + 1]! << 8) : (bytes[i]! << 8) | bytes[i + 1]!)
    parts.push(String.fromCharCode(...units))
  }
  return parts.join('')
}

/** What bytes 0x80 to 0x9f stand for in Windows-1252; a blank where they stand for nothing. */
const WINDOWS_1252 = '€ ‚ƒ„…†‡ˆ‰Š‹Œ Ž  ‘’“”•–—˜™š›œ žŸ'

function fromWindows1252(bytes: Uint8Array, place: Place): string {
  const parts: string[] = []
  bytes.forEach((byte, i) => {
    const sign = byte >= 0x80 && byte < 0xa0 ? WINDOWS_1252[byte - 0x80]! : String.fromCharCode(byte)
    if (sign === ' ' && byte !== 0x20)
      throw new Fault('file.garbled', { ...place, detail: { byte: i + 1, wanted: 'UTF-8 or Windows-1252' } })
    parts.push(sign)
  })
  return parts.join('')
}

/** Strict UTF-8: no overlong forms, no surrogates, nothing above U+10FFFF. */
function utf8(bytes: Uint8Array, place: Place): string {
  const parts: string[] = []
  let i = 0
  while (i < bytes.length) {
    const units: number[] = []
    while (i < bytes.length && units.length < STRIDE) {
      const first = bytes[i]!
      if (first < 0x80) {
        units.push(first)
        i += 1
        continue
      }
      const length = first >= 0xf0 ? 4 : first >= 0xe0 ? 3 : 2
      const point = sequence(bytes, i, length)
      if (point === undefined) throw unreadable(bytes, i, place)
      if (point > 0xffff) units.push(0xd800 + ((point - 0x10000) >> 10), 0xdc00 + ((point - 0x10000) & 0x3ff))
      else units.push(point)
      i += length
    }
    parts.push(String.fromCharCode(...units))
  }
  return parts.join('')
}

const LEAST = [0, 0, 0x80, 0x800, 0x10000]

function sequence(bytes: Uint8Array, at: number, length: number): number | undefined {
  const first = bytes[at]!
  if (first < 0xc2 || first > 0xf4) return undefined
  let point = first & (0x7f >> length)
  for (let k = 1; k < length; k++) {
    const next = bytes[at + k]
    if (next === undefined || (next & 0xc0) !== 0x80) return undefined
    point = (point << 6) | (next & 0x3f)
  }
  const surrogate = point >= 0xd800 && point <= 0xdfff
  return point < LEAST[length]! || point > 0x10ffff || surrogate ? undefined : point
}

/** A file with zero bytes or control bytes in its head is no text at all; else its encoding is another. */
function unreadable(bytes: Uint8Array, at: number, place: Place): Fault {
  const binary = bytes.subarray(0, 4096).some((byte) => byte < 9 || (byte > 13 && byte < 32))
  if (binary) return new Fault('file.binary', place)
  return new Fault('file.garbled', { ...place, detail: { byte: at + 1, wanted: 'UTF-8' } })
}
