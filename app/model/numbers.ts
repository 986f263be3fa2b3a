/**
 * Typed number text in and out. One parser for field, paste and table: decimal point or comma, groups of three,
 * the minus of the keyboard and of typography. What could be read in two ways is refused, not guessed: a silent
 * factor of a thousand is the worst that a number can do here.
 */

/** Codes of the catalogue of faults, so that a caller adds the place and nothing else. */
export type NumberSlip = 'number.empty' | 'number.malformed' | 'number.ambiguous' | 'number.large'
export type ParsedNumber = { ok: true; value: number } | { ok: false; code: NumberSlip }

const MINUS = '\u2212'
const BLANKS = '\\u0020\\u00a0\\u2007\\u2009\\u202f'
const PLAIN = /^(\d*)(?:[.,](\d*))?$/
const BLANK_GROUPS = new RegExp(`^\\d{1,3}(?:[${BLANKS}'\\u2019]\\d{3})+(?:[.,]\\d*)?$`)
const COMMA_GROUPS = /^[1-9]\d{0,2}(?:(?:,\d{3})+\.\d*|(?:,\d{3}){2,})$/
const POINT_GROUPS = /^[1-9]\d{0,2}(?:(?:\.\d{3})+,\d*|(?:\.\d{3}){2,})$/
/** One separator before exactly three digits: thousands to one reader, decimals to another. */
const THREE = /^[1-9]\d{0,2}([.,])\d{3}$/

/**
 * The number that a text stands for. `decimal` is the sign known to stand before decimals where the text comes
 * from; left out, `1,234` is refused as ambiguous, while `1.234`, `1,2345` and `0,123` are not.
 */
export function parseNumber(text: string, decimal: '.' | ',' = '.'): ParsedNumber {
  const typed = text.replace(/^[\s\ufeff]+|[\s\ufeff]+$/g, '')
  if (typed === '') return { ok: false, code: 'number.empty' }
  const parts = /^([-+\u2212]?)\s*([^eE]+)(?:[eE]([-+\u2212]?\d{1,3}))?$/.exec(typed)
  if (!parts) return { ok: false, code: 'number.malformed' }
  const digits = parts[2]!
  const three = THREE.exec(digits)
  if (three && three[1] !== decimal) return { ok: false, code: 'number.ambiguous' }
  const plain = plainDigits(digits)
  if (plain === undefined)
    return { ok: false, code: /^\d[\d.,\s'\u2019]*\d$/.test(digits) ? 'number.ambiguous' : 'number.malformed' }
  const sign = parts[1] === '' || parts[1] === '+' ? '' : '-'
  const value = Number(`${sign}${plain}e${(parts[3] ?? '0').replace(MINUS, '-')}`)
  return Number.isFinite(value) ? { ok: true, value: value + 0 } : { ok: false, code: 'number.large' }
}

/** Digits with a decimal point and no groups; undefined where the grouping is of no one style. */
function plainDigits(digits: string): string | undefined {
  if (BLANK_GROUPS.test(digits)) return digits.replace(/[^\d.,]/g, '').replace(',', '.')
  if (COMMA_GROUPS.test(digits)) return digits.replaceAll(',', '')
  if (POINT_GROUPS.test(digits)) return digits.replaceAll('.', '').replace(',', '.')
  const plain = PLAIN.exec(digits)
  if (!plain || !(plain[1] || plain[2])) return undefined
  return `${plain[1] || '0'}.${plain[2] || '0'}`
}

/** A number with so many decimals and a typographic minus; no minus before a zero. */
export function fixed(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return '\u2013'
  const text = Math.abs(value).toFixed(decimals)
  return value < 0 && /[1-9]/.test(text) ? MINUS + text : text
}

/** A level or a staff reading in m, to a tenth of a millimetre. */
export function level(m: number): string {
  return fixed(m, 4)
}

/** A movement in mm; a tenth where nothing else is asked for. */
export function millimetres(mm: number, decimals = 1): string {
  return fixed(mm, decimals)
}

/** A moment in kNm, or a force in kN, to three figures, never finer than a hundredth. */
export function moment(kNm: number): string {
  const size = Math.abs(kNm)
  if (size < 0.005) return '0'
  const figures = Number(size.toPrecision(3))
  const decimals = figures >= 100 ? 0 : figures >= 10 ? 1 : 2
  return fixed(Math.sign(kNm) * figures, decimals)
}

/** A moment with the half width of its interval, to the same place: `31.7 ± 3.1`; apart, so that both can be aligned. */
export function momentWithInterval(kNm: number, half: number): [value: string, interval: string] {
  const size = Math.max(Math.abs(kNm), 0)
  const decimals = size >= 99.95 ? 0 : 1
  return [fixed(kNm, decimals), fixed(half, decimals)]
}

/** A rotation or distortion in rad as 1/n, n to three figures; `none` below 1/100000. */
export function ratio(rad: number): string {
  const size = Math.abs(rad)
  if (size < 1e-5) return 'none'
  if (!Number.isFinite(size)) return fixed(size, 0)
  const n = Number((1 / size).toPrecision(3))
  return `${rad < 0 ? MINUS : ''}1/${n >= 10 ? n.toFixed(0) : n.toPrecision(2).replace(/\.0$/, '')}`
}

/** A fraction as a percentage: one decimal below 100 %, its sign kept with the figure. */
export function percent(fraction: number): string {
  const value = fraction * 100
  return Number.isFinite(value) ? `${fixed(value, Math.abs(value) < 99.95 ? 1 : 0)}\u00a0%` : fixed(value, 0)
}
