/** The face of the solver: everything that others may import. kN, m, rad; signs as types.ts states them. */
export * from './types.ts'

export { bendingAt, extremeBending, shearAt } from './frame/along.ts'
export type { BendingPoint, LoadAlong, MemberAlong } from './frame/along.ts'
export { factorFrame } from './frame/factor.ts'
export type { FactoredFrame } from './frame/factor.ts'
export { baseInfluence, tiltResponse } from './frame/influence.ts'
export { loadResponse } from './frame/loads.ts'
export { memberStiffness, settlementEndMoments } from './frame/member.ts'
export type { Member } from './frame/member.ts'
