import { describe, expect, it } from 'vitest'
import { DEFAULT_CRITERIA } from '../../app/model/building.ts'
import { LIMIT_SETS, limitSetOf } from '../../app/model/limit-sets.ts'

describe('published limits of angular distortion', () => {
  it('are those of Skempton and MacDonald 1956 and Bjerrum 1963 (as quoted in public reports on them)', () => {
    const pairs = LIMIT_SETS.map(({ id, triggers }) => [
      id,
      Math.round(1 / triggers.amber),
      Math.round(1 / triggers.red),
    ])
    expect(pairs).toEqual([
      ['frame', 500, 150],
      ['panels', 500, 300],
      ['diagonals', 750, 600],
      ['no-cracking', 1000, 500],
      ['hogging', 1000, 300],
      ['sowers-concrete', 400, 250],
      ['sowers-brick', 2000, 1000],
    ])
  })

  it('have amber below red, a source, and are told from one another', () => {
    for (const set of LIMIT_SETS) {
      expect(set.triggers.amber).toBeLessThan(set.triggers.red)
      expect(set.source.length).toBeGreaterThan(20)
      expect(limitSetOf(set.triggers)).toBe(set)
    }
  })

  it('hold unless something else is chosen, and own triggers are known as own', () => {
    expect(limitSetOf(DEFAULT_CRITERIA.angular_distortion)?.id).toBe('frame')
    expect(limitSetOf({ amber: 0.0021, red: 0.005 })).toBeUndefined()
  })
})
