/** What goes into the report, in its order. */
export const PARTS = [
  'Title, status and cautions',
  'What was measured, how sure it is',
  'Plan and worst elevations',
  'What each support has left',
  'Supports, spans and members, worst first',
  'Flagged members and what makes them so',
  'Method, assumptions, limits with sources',
  'What is not covered',
  'Sign-off for the licensed engineer',
  'Level book',
  'Verification of the program',
]
