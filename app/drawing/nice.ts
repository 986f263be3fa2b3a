/** Round figures: of scales, steps of axes and factors of exaggeration. */

const STEPS = [1, 1.5, 2, 2.5, 3, 4, 5, 6, 8]

/** The greatest of 1, 1.5, 2, 2.5, 3, 4, 5, 6, 8 times a power of ten that does not exceed a positive value. */
export function niceBelow(value: number, steps: readonly number[] = STEPS): number {
  const power = 10 ** Math.floor(Math.log10(value))
  const best = steps.filter((s) => s * power <= value * (1 + 1e-9)).at(-1) ?? 1
  return Number((best * power).toPrecision(3))
}

/** The least of 1, 2, 2.5, 5 times a power of ten that is not below a positive value. */
export function niceStep(atLeast: number): number {
  const power = 10 ** Math.floor(Math.log10(atLeast))
  const step = [1, 2, 2.5, 5, 10].find((s) => s * power >= atLeast * (1 - 1e-9)) ?? 10
  return Number((step * power).toPrecision(3))
}

/** Multiples of a step within two bounds, both included. */
export function multiples(step: number, from: number, to: number): number[] {
  const first = Math.ceil(from / step - 1e-9)
  const count = Math.floor(to / step + 1e-9) - first + 1
  return Array.from({ length: Math.max(0, count) }, (_, i) => Number(((first + i) * step).toPrecision(12)) + 0)
}
