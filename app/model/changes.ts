/**
 * Changes of a building's description, one entity at a time. An edit is a sentence and a list of changes; its
 * reverse is the same list backwards with before and after exchanged, which is what undo applies.
 */
import type {
  Building,
  Criteria,
  FrameLine,
  FrameNode,
  GivenCriteria,
  Member,
  Section,
  Support,
  SurveyPoint,
} from './building.ts'

/** Name, reference, client, address and notes. */
export type BuildingHead = Pick<Building, 'name' | 'reference' | 'client' | 'address' | 'notes'>

/**
 * One entity put in place (`after` given) or taken away (`after` null). `before` is null for a new entity.
 * `at` is its place in its list; left out, an existing entity stays where it is and a new one comes last.
 * A frame line is put without its nodes and members, which are entities of their own.
 */
export type Change =
  | { kind: 'head'; before: BuildingHead; after: BuildingHead }
  | { kind: 'criteria'; before: GivenCriteria | null; after: GivenCriteria | null }
  | { kind: 'support'; id: string; at?: number; before: Support | null; after: Support | null }
  | { kind: 'section'; id: string; at?: number; before: Section | null; after: Section | null }
  | { kind: 'line'; id: string; at?: number; before: Pick<FrameLine, 'id'> | null; after: Pick<FrameLine, 'id'> | null }
  | { kind: 'node'; line: string; id: string; at?: number; before: FrameNode | null; after: FrameNode | null }
  | { kind: 'member'; line: string; id: string; at?: number; before: Member | null; after: Member | null }
  | { kind: 'point'; id: string; at?: number; before: SurveyPoint | null; after: SurveyPoint | null }

/** A named edit. */
export interface Edit {
  /** What it does, as in the undo menu: "Move support B2". */
  what: string
  changes: readonly Change[]
}

export type { Criteria }
