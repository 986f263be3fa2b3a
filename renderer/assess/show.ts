/** What the sheet of Assess shows. */
export interface SheetShow {
  deformed: boolean
  moments: boolean
  loads: boolean
  contours: boolean
  /** Exaggeration of the deformed line; undefined: fitted to the drawing. */
  factor?: number
}

export const SHOWN_FIRST: SheetShow = { deformed: true, moments: true, loads: false, contours: true }
