/** Where a fault of a round stands: at a cell of the grid, or at a value of its head. */
import { words, type FaultRecord } from '../../app/model/faults.ts'
import { cellKey } from './round-cells.ts'

const CELLS = ['point', 'back_m', 'mid_m', 'fore_m', 'sight_m', 'back_sight_m', 'level_m', 'sd_mm']
const HEAD = [
  'date',
  'observer',
  'instrument',
  'weather',
  'sd_mm_per_sqrt_km',
  'sd_mm_per_setup',
  'collimation_mm_per_10_m',
]
/** Faults that name a row and no key, by the cell that mends them. */
const CELL_OF: Record<string, string> = {
  'sight.missing': 'sight_m',
  'sight.lengthless': 'sight_m',
  'row.crowded': 'mid_m',
}

export interface PlacedFaults {
  /** By `row:key`. */
  cells: ReadonlyMap<string, string>
  /** By key. */
  head: ReadonlyMap<string, readonly FaultRecord[]>
  /** What stands at no one place of the round. */
  rest: readonly FaultRecord[]
}

/** Puts every fault beside the thing it is about; of several at one cell, the first. */
export function placed(faults: Iterable<FaultRecord>): PlacedFaults {
  const cells = new Map<string, string>()
  const head = new Map<string, FaultRecord[]>()
  const rest: FaultRecord[] = []
  for (const fault of faults) {
    const { path, element } = fault.place
    const key = /[^.]+$/.exec(path ?? '')?.[0] ?? ''
    if (element?.kind === 'row') {
      const at = cellKey(Number(element.id) - 1, CELLS.includes(key) ? key : (CELL_OF[fault.code] ?? 'point'))
      if (!cells.has(at)) cells.set(at, sentence(fault))
    } else if (HEAD.includes(key)) head.set(key, [...(head.get(key) ?? []), fault])
    else if (fault.code === 'book.sdless') head.set('sd_mm_per_sqrt_km', [fault])
    else rest.push(fault)
  }
  return { cells, head, rest }
}

function sentence(fault: FaultRecord): string {
  const { what, todo } = words(fault)
  return `${what} ${todo}`
}
