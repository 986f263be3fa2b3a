import type { Material } from '../../app/model/building.ts'

export const MATERIALS: readonly { value: Material; text: string }[] = [
  { value: 'concrete', text: 'concrete' },
  { value: 'steel', text: 'steel' },
  { value: 'timber', text: 'timber' },
  { value: 'masonry', text: 'masonry' },
  { value: 'other', text: 'other' },
]
