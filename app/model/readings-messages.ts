/** Sentences of faults of rounds, points, rows and readings tables that are read in. */
import { list, meant, shown, subject, type FaultMessage } from './fault-words.ts'

const READINGS = 'The readings are as they were.'

export const readingsMessages = {
  'date.malformed': {
    what: (p) => `${subject(p)} is ${shown(p.value)}, which is no date of the form yyyy-mm-dd.`,
    kept: READINGS,
    todo: (p) => (p.detail?.date === undefined ? 'Write it as 2026-03-02.' : `Write it as ${String(p.detail.date)}.`),
  },
  'date.impossible': {
    what: (p) => `${subject(p)} is ${shown(p.value)}, a day that no calendar has.`,
    kept: READINGS,
    todo: () => 'Correct the day or the month.',
  },
  'date.divided': {
    what: (p) => `Round ${p.detail?.round} has the date ${shown(p.value)} here and ${p.detail?.other} before.`,
    kept: READINGS,
    todo: () => 'Give all rows of a round one date, or the later ones a round of their own.',
  },
  'round.readingless': {
    what: (p) => `Round ${p.detail?.round} has neither levels nor a level book.`,
    kept: READINGS,
    todo: () => 'Give it "levels" or a "book", or take it out.',
  },
  'round.doubled': {
    what: (p) => `Round ${p.detail?.round} has levels and a level book as well.`,
    kept: READINGS,
    todo: () => 'Keep the one that was measured; the levels follow from the book.',
  },
  'round.present': {
    what: (p) => `Round ${shown(p.value)} is in the building already.`,
    kept: READINGS,
    todo: () => 'Give the new round another name; to mend an accepted round, correct it and give the reason.',
  },
  'point.unknown': {
    what: (p) => `There is no point ${shown(p.value)} in the survey.${meant(p)}`,
    kept: READINGS,
    todo: (p) =>
      p.detail?.turned === undefined
        ? 'Correct its name, or describe it as a stud or a benchmark first.'
        : 'Correct its name, or describe it first; a change point has a foresight and then a backsight.',
  },
  'point.repeated': {
    what: (p) =>
      `${subject(p)}: ${shown(p.value)} is read a second time${p.detail?.setup === undefined ? ' in the round' : ' from the same setup'}, first in ${p.detail?.first}.`,
    kept: READINGS,
    todo: () => 'Keep the one that holds, or name the point that was really read.',
  },
  'row.crowded': {
    what: (p) => `${subject(p)}: an intermediate sight and a foresight stand in one row.`,
    kept: READINGS,
    todo: () => 'Keep the one that was read: a foresight closes a setup, an intermediate sight does not.',
  },
  'row.long': {
    what: (p) => `${p.path} has ${shown(p.value)} cells, and the heading ${p.detail?.most}.`,
    kept: READINGS,
    todo: () => 'Take the surplus cells out; where commas stand before decimals, separate the cells by semicolons.',
  },
  'quote.open': {
    what: (p) => `${p.path}: a quote is opened and never closed.`,
    kept: READINGS,
    todo: () => 'Close it, or take it out.',
  },
  'table.headless': {
    what: (p) => `The first row, ${shown(p.value)}, names no columns of a readings table.`,
    kept: READINGS,
    todo: () =>
      'Head it round,date,point,level_m,sd_mm for levels, or round,date,point,back_m,mid_m,fore_m,sight_m for a level book.',
  },
  'table.mixed': {
    what: (p) => `The heading has columns of levels and of a level book: ${list(p.detail?.columns)}.`,
    kept: READINGS,
    todo: () => 'Keep levels and level books in tables of their own.',
  },
  'table.rowless': {
    what: () => 'The table has a heading and no rows.',
    kept: READINGS,
    todo: () => 'Put the readings below the heading.',
  },
  'column.missing': {
    what: (p) => `The column ${shown(p.value)} is missing.`,
    kept: READINGS,
    todo: () => 'Add it to the heading, with its value in each row.',
  },
  'column.unknown': {
    what: (p) => `There is no column ${shown(p.value)}.${meant(p)}`,
    kept: READINGS,
    todo: (p) =>
      p.detail?.nearest === undefined ? 'Take the column out.' : `Head it ${String(p.detail.nearest)}, or take it out.`,
  },
  'column.unit': {
    what: (p) => `The column ${shown(p.value)} is in another unit than ${p.detail?.column}.`,
    kept: READINGS,
    todo: (p) => `Convert its values, and head it ${p.detail?.column}.`,
  },
  'column.repeated': {
    what: (p) => `Two columns are headed for ${p.detail?.column}: ${shown(p.value)} is the second.`,
    kept: READINGS,
    todo: () => 'Keep one of them.',
  },
} satisfies Record<string, FaultMessage>
