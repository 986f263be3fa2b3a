/** What a table of members says of one in a few signs. */
import { capacityOf, type Member, type MemberLoad, type Section } from '../../app/model/building.ts'
import { uniformOf } from '../../app/model/edits/loads.ts'

export type PointLoad = Extract<MemberLoad, { kind: 'point' }>

/** Point loads of a member with their places in its list of loads. */
export function pointLoadsOf(member: Member): { load: PointLoad; index: number }[] {
  return (member.loads ?? []).flatMap((load, index) => (load.kind === 'point' ? [{ load, index }] : []))
}

/** "18 + 6", and how many point loads besides; a dash where there is none. */
export function loadWords(member: Member): string {
  const [permanent, variable] = [uniformOf(member, 'permanent'), uniformOf(member, 'variable')]
  const points = pointLoadsOf(member).length
  const parts = [
    permanent === undefined && variable === undefined ? '' : `${permanent ?? 0} + ${variable ?? 0}`,
    points === 0 ? '' : `${points} point`,
  ].filter(Boolean)
  return parts.join(', ') || '–'
}

/** Sagging / hogging / shear, the section's where the member has none of its own. */
export function capacityWords(member: Member, section: Section | undefined): string {
  const { sagging_kNm, hogging_kNm, shear_kN } = capacityOf(member, section ?? {})
  if (sagging_kNm === undefined && shear_kN === undefined) return '–'
  return [sagging_kNm ?? '–', hogging_kNm ?? '–', shear_kN ?? '–'].join(' / ')
}

export function pinWords(member: Member): string {
  return [member.pin_from ? 'from' : '', member.pin_to ? 'to' : ''].filter(Boolean).join(', ') || '–'
}

/** The one value that all have; undefined where they differ or there is none to ask. */
export function shared<T>(values: readonly T[]): { same: true; value: T } | { same: false } {
  const [first] = values
  return values.length > 0 && values.every((value) => value === first) ? { same: true, value: first! } : { same: false }
}
