/** Classes of levelling by the misclosure they allow: k mm times the root of kilometres or of setups. */

export interface Allowance {
  id: string
  name: string
  per: 'km' | 'setup'
  k_mm: number
  source: string
}

const FGCC =
  'Federal Geodetic Control Committee, Standards and Specifications for Geodetic Control Networks, 1984 (from memory)'

export const ALLOWANCES: readonly Allowance[] = [
  { id: 'precise-km', name: 'precise', per: 'km', k_mm: 4, source: 'common practice' },
  { id: 'monitoring-setup', name: 'building monitoring', per: 'setup', k_mm: 1, source: 'common practice' },
  { id: 'fgcc-first-2', name: 'first order, class II, loop', per: 'km', k_mm: 5, source: FGCC },
  { id: 'fgcc-second-1', name: 'second order, class I', per: 'km', k_mm: 6, source: FGCC },
  { id: 'fgcc-second-2', name: 'second order, class II', per: 'km', k_mm: 8, source: FGCC },
  { id: 'fgcc-third', name: 'third order', per: 'km', k_mm: 12, source: FGCC },
  { id: 'building-setup', name: 'building work', per: 'setup', k_mm: 5, source: 'common practice' },
]

/** Used where none is chosen: by length where every sight is booked, else by setups. */
export const DEFAULT_ALLOWANCE = { km: ALLOWANCES[0]!, setup: ALLOWANCES[1]! }

/** What a loop or line may misclose, in mm; undefined where the class asks for a length that is not booked. */
export function allowedMisclosure(
  allowance: Allowance,
  setups: number,
  length_km: number | undefined,
): number | undefined {
  if (allowance.per === 'setup') return allowance.k_mm * Math.sqrt(setups)
  return length_km === undefined ? undefined : allowance.k_mm * Math.sqrt(length_km)
}
