/** Fault sentences of project files, rounds in them and issued reports. */
import { NOTHING_WRITTEN, shown, type FaultMessage } from './fault-words.ts'

export const projectMessages = {
  'core.lost': {
    what: () => 'The program behind this window does not answer.',
    kept: 'Everything that was entered before is in the file.',
    todo: () => 'Start Levelstead again; the file opens as it was.',
  },
  'draft.present': {
    what: (p) => `A draft of round ${shown(p.value)} is being booked.`,
    kept: 'The draft is as it was, and nothing of the table was written.',
    todo: () => 'Accept or discard that draft first, or give the round of the table another name.',
  },
  'draft.unknown': {
    what: (p) => `There is no draft of a round ${shown(p.value)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Begin the round in Log, or name another draft.',
  },
  'edit.none': {
    what: (p) => `There is nothing to ${p.value === 'redo' ? 'redo' : 'undo'}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Go on.',
  },
  'project.damaged': {
    what: (p) =>
      `${shown(p.file)} is damaged${p.detail?.reason ? ` (${String(p.detail.reason)})` : ''}: it cannot be read whole.`,
    kept: 'It was not touched.',
    todo: (p) =>
      p.detail?.copies
        ? `Keep it, and open the latest sound copy in ${shown(p.detail.copies)}.`
        : 'Keep it, and open a copy of it from a backup.',
  },
  'project.foreign': {
    what: (p) => `${shown(p.file)} is no Levelstead project.`,
    kept: 'It was not touched.',
    todo: (p) =>
      p.detail?.isBuilding
        ? 'It looks like a building file: import it to make a project of it.'
        : 'Choose a file that ends in .levelstead.',
  },
  'project.newer': {
    what: (p) =>
      `${shown(p.file)} was written by a newer version of Levelstead (its format is ${shown(p.value)}, this version knows ${p.detail?.known}).`,
    kept: 'It was not touched.',
    todo: () => 'Open it with that version, or a later one.',
  },
  'project.none': {
    what: () => 'No project is open.',
    kept: NOTHING_WRITTEN,
    todo: () => 'Open a project, start one, or look at the example.',
  },
  'reason.empty': {
    what: () => 'No reason is given.',
    kept: NOTHING_WRITTEN,
    todo: () => 'Say in a few words why, for whoever reads the record later.',
  },
  'report.overtaken': {
    what: (p) => `The project changed while the report of round ${shown(p.value)} was being set.`,
    kept: 'The project is as it is now; no report was issued.',
    todo: () => 'Look at the results as they are now, then issue the report again.',
  },
  'report.unknown': {
    what: (p) => `There is no issued report with number ${shown(p.value)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Choose one of the register.',
  },
  'rounds.none': {
    what: () => 'There is no accepted round yet.',
    kept: NOTHING_WRITTEN,
    todo: () => 'Accept a round in Log first.',
  },
  'round.draft': {
    what: (p) => `Round ${shown(p.value)} is a draft: it is not accepted yet.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Accept it first, then come back.',
  },
  'round.frozen': {
    what: (p) => `Round ${shown(p.value)} is accepted: its readings are frozen.`,
    kept: 'The readings are as they were.',
    todo: () => 'Enter a correction with a reason; the old readings stay to be seen.',
  },
} satisfies Record<string, FaultMessage>
