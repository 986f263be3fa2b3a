/** Which of the four places the person is in. */
import { contextOf } from './context.ts'

export const PLACES = [
  { id: 'describe', name: 'Describe' },
  { id: 'log', name: 'Log' },
  { id: 'assess', name: 'Assess' },
  { id: 'issue', name: 'Issue' },
] as const

export type PlaceName = (typeof PLACES)[number]['id']

export class PlacesState {
  now = $state<PlaceName>('assess')

  go(place: PlaceName): void {
    this.now = place
  }
}

const context = contextOf<PlacesState>('places')
export const handPlaces = context.hand
export const usePlaces = context.use
