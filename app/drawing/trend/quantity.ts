/** What a trend shows, and how its figures read. */
import { fixed, millimetres, moment, percent, ratio } from '../../model/numbers.ts'
import type { Role } from '../scene.ts'

export type Quantity = 'settlement' | 'angular distortion' | 'end moment' | 'induced fraction' | 'utilisation'

interface Kind {
  /** Of the axis. */
  unit: string
  /** From the value to the figure on the axis. */
  factor: number
  role: Role
  /** Settlement is drawn downwards, as the ground goes. */
  isDown: boolean
  /** Never negative. */
  isMagnitude: boolean
  words: (value: number) => string
}

export const KINDS: Readonly<Record<Quantity, Kind>> = {
  settlement: {
    unit: 'mm',
    factor: 1,
    role: 'series',
    isDown: true,
    isMagnitude: false,
    words: (v) => `${millimetres(v)} mm`,
  },
  'angular distortion': {
    unit: '1/1000',
    factor: 1000,
    role: 'series',
    isDown: false,
    isMagnitude: false,
    words: ratio,
  },
  'end moment': {
    unit: 'kNm',
    factor: 1,
    role: 'series-moment',
    isDown: false,
    isMagnitude: false,
    words: (v) => `${moment(v)} kNm`,
  },
  'induced fraction': {
    unit: '% of capacity',
    factor: 100,
    role: 'series-moment',
    isDown: false,
    isMagnitude: true,
    words: percent,
  },
  utilisation: {
    unit: '% of capacity',
    factor: 100,
    role: 'series-moment',
    isDown: false,
    isMagnitude: true,
    words: percent,
  },
}

/** A figure of the axis: as many decimals as its step has. */
export function axisWords(value: number, step: number): string {
  const decimals = Math.max(0, Math.ceil(-Math.log10(step) - 1e-9))
  const isWhole = Number.isInteger(Number((step * 10 ** decimals).toPrecision(6)))
  return fixed(value, isWhole ? decimals : decimals + 1)
}
