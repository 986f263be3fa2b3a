/** Text sizes and gaps that all drawings share, mm. */

/** Figures and names: capitals 2.2 mm high, as a drawing to be read at arm's length wants them. */
export const TEXT = 3.1
/** What explains: row titles, legends, tolerances. */
export const SMALL = 2.7
/** Kept free along the edge of the sheet. */
export const EDGE = 1.5
/** Size of a status mark beside a text. */
export const MARK = 2.4
