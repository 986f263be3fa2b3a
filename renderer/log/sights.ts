/** The column of the grid that each kind of sight is booked in. */
export const SIGHT_KEYS = { back: 'back_m', mid: 'mid_m', fore: 'fore_m' } as const
