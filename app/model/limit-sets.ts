/**
 * Published limits of angular distortion by kind of structure, as pairs of triggers. Where a source gives one value it is
 * the red one, and amber is the next lower value of the same source. Values seen in reports on the originals or from
 * memory are marked; local codes govern.
 */
import type { Triggers } from './building.ts'

export interface LimitSet {
  id: string
  /** Structure and finish that it was published for. */
  structure: string
  triggers: Triggers
  source: string
}

const SKEMPTON = 'Skempton and MacDonald, Proc. ICE 5 (III), 1956, 727\u2013768'
const BJERRUM = 'Bjerrum, Proc. European Conf. SMFE, Wiesbaden, 1963, vol. 2, 135\u2013137'
const SOWERS = 'Sowers, in Leonards (ed.), Foundation Engineering, 1962'
const EUROCODE = 'EN 1997-1:2004 Annex H'

/** As decimals of four figures, so that they read as the 1/n that they are. */
function slopes(amber: number, red: number): Triggers {
  return { amber: Number((1 / amber).toPrecision(4)), red: Number((1 / red).toPrecision(4)) }
}

export const LIMIT_SETS: readonly LimitSet[] = [
  {
    id: 'frame',
    structure: 'open frames: recommended limit, structural damage',
    triggers: slopes(500, 150),
    source: `1/500 and 1/150: ${SKEMPTON}; ${BJERRUM}; ${EUROCODE}`,
  },
  {
    id: 'panels',
    structure: 'frames with panel walls: recommended limit, first cracking',
    triggers: slopes(500, 300),
    source: `1/500 and 1/300: ${SKEMPTON}; ${BJERRUM}`,
  },
  {
    id: 'diagonals',
    structure: 'frames with diagonals, or machinery sensitive to settlement',
    triggers: slopes(750, 600),
    source: `1/750 and 1/600: ${BJERRUM}`,
  },
  {
    id: 'no-cracking',
    structure: 'no cracking is permissible',
    triggers: slopes(1000, 500),
    source: `1/1000: ${SKEMPTON} (from memory); 1/500: ${BJERRUM}`,
  },
  {
    id: 'hogging',
    structure: 'frames whose edge settles more (hogging)',
    triggers: slopes(1000, 300),
    source: `half of 1/500 and 1/150 for hogging: ${EUROCODE}, H(3)`,
  },
  {
    id: 'sowers-concrete',
    structure: 'reinforced concrete building frames',
    triggers: { amber: 0.0025, red: 0.004 },
    source: `0.0025 to 0.004: ${SOWERS}`,
  },
  {
    id: 'sowers-brick',
    structure: 'high continuous brick walls',
    triggers: { amber: 0.0005, red: 0.001 },
    source: `0.0005 to 0.001: ${SOWERS}`,
  },
]

/** The published set that a pair of triggers is; undefined where it is somebody's own. */
export function limitSetOf({ amber, red }: Triggers): LimitSet | undefined {
  return LIMIT_SETS.find(({ triggers }) => near(triggers.amber, amber) && near(triggers.red, red))
}

function near(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-3 * a
}
