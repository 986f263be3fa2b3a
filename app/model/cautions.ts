/** What is always said wherever results are shown for use: once here, for window, report and command line. */

export const CAUTIONS: readonly string[] = [
  "Levelstead supports an engineer's judgement and does not replace it.",
  'Results are an elastic analysis of the frame as described; what is not described is not assessed.',
  'Local codes and regulations govern.',
  'For review by a licensed engineer before anyone relies on them.',
]

/** One line, for the foot of every page and screen. */
export const CAUTION_LINE =
  "Supports an engineer's judgement; for review by a licensed engineer before anyone relies on it."

/** Said in addition wherever a flag is red. */
export const RED_CAUTION =
  'Red: do not wait for the report. Tell the responsible engineer now, and if there is visible distress keep people out.'
