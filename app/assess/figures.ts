/** Figures in sentences: a sensible number of digits and a true minus sign. */

/** A value with so many significant figures, never in powers of ten. */
export function figure(value: number, digits = 3): string {
  if (!Number.isFinite(value)) return 'none'
  if (value === 0) return '0'
  const whole = Math.floor(Math.log10(Math.abs(value))) + 1
  return fixed(Number(value.toPrecision(digits)), Math.min(Math.max(digits - whole, 0), 9))
}

/** A value with so many decimals. */
export function fixed(value: number, decimals: number): string {
  const text = Math.abs(value).toFixed(decimals)
  return value < 0 && Number(text) !== 0 ? `\u2212${text}` : text
}

/** A slope as 1/n, with its sign; level where it is less than one in a million. */
export function slope(rad: number): string {
  if (Math.abs(rad) < 1e-6) return '0'
  return `${rad < 0 ? '\u2212' : ''}1/${Math.round(1 / Math.abs(rad))}`
}

/** A value inside a formula: in brackets where it is negative. */
export function term(value: number, digits = 3): string {
  const text = figure(value, digits)
  return text.startsWith('\u2212') ? `(${text})` : text
}
