/** Sentences of faults of files, keys and values that are read in; those of readings are beside. */
import { all, list, meant, NOTHING_WRITTEN, shown, subject, type FaultMessage } from './fault-words.ts'

const AS_WAS = 'The description is as it was.'
const READINGS = 'The readings are as they were.'

export const inputMessages = {
  'file.empty': {
    what: (p) => `${p.file ?? 'The file'} is empty.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Check that this is the right file and that it was saved or copied whole.',
  },
  'file.binary': {
    what: (p) => `${p.file ?? 'The file'} is not text.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Name a building file (JSON text) or a readings table (text); a spreadsheet is first saved as CSV.',
  },
  'file.project': {
    what: (p) => `${p.file ?? 'The file'} is a database, as project files are, and not text.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Open it as a project, or export it to a building file first.',
  },
  'file.garbled': {
    what: (p) =>
      `${p.file ?? 'The file'} is not ${p.detail?.wanted ?? 'UTF-8'} text: byte ${p.detail?.byte} does not fit.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Save it as UTF-8, and check that it was copied whole.',
  },
  'file.malformed': {
    what: (p) => `${p.path ?? 'The text'}: ${String(p.value)} stands where ${p.detail?.expected} was expected.`,
    kept: NOTHING_WRITTEN,
    todo: (p) => String(p.detail?.remedy ?? 'Correct the text there; it must be JSON.'),
  },
  'file.cut': {
    what: (p) =>
      `${p.file ?? 'The file'} ends in the middle, where ${p.detail?.expected} was expected: it is not whole.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Save or copy the whole file again.',
  },
  'file.deep': {
    what: (p) =>
      `${p.path ?? 'The text'}: brackets stand ${p.detail?.most ?? 64} deep inside each other, as in no building file.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Check that this is the right file.',
  },
  'file.foreign': {
    what: (p) => `This is no building file: its format is ${shown(p.value)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Name a file whose format is "levelstead-building".',
  },
  'file.newer': {
    what: (p) =>
      `It was written by a newer version: its version is ${shown(p.value)}, and ${p.detail?.newest ?? 1} is the newest known here.`,
    kept: 'The file is as it was.',
    todo: () => 'Open it with the version of the program that wrote it, or a later one.',
  },
  'file.version': {
    what: (p) => `There is no version ${shown(p.value)} of the building file.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Write the version as 1.',
  },
  'key.unknown': {
    what: (p) => `There is no key ${shown(p.detail?.key)} here.${meant(p)}`,
    kept: AS_WAS,
    todo: (p) =>
      p.detail?.nearest === undefined
        ? `Take it out; the keys here are ${all(p.detail?.keys)}.`
        : `Write it as ${String(p.detail.nearest)}, or take it out.`,
  },
  'key.missing': {
    what: (p) => `${subject(p)} is missing.`,
    kept: AS_WAS,
    todo: (p) => `Give it: ${p.detail?.wanted ?? 'a value'}.`,
  },
  'key.repeated': {
    what: (p) => `${subject(p)} stands twice in the same place; only one can hold.`,
    kept: AS_WAS,
    todo: () => 'Take one of the two out.',
  },
  'value.unfit': {
    what: (p) => `${subject(p)} is ${shown(p.value)}; it must be ${p.detail?.wanted}.`,
    kept: AS_WAS,
    todo: (p) => String(p.detail?.remedy ?? `Write ${p.detail?.wanted}.`),
  },
  'number.quoted': {
    what: (p) => `${subject(p)} is the text ${shown(p.value)}; it must be a number.`,
    kept: AS_WAS,
    todo: (p) =>
      p.detail?.number === undefined
        ? 'Write a number without quotes, with a decimal point.'
        : `Write it without quotes, with a decimal point: ${p.detail.number}.`,
  },
  'number.infinite': {
    what: (p) => `${subject(p)} is larger than any number that can be held.`,
    kept: AS_WAS,
    todo: () => 'Write a finite number.',
  },
  'number.undefined': {
    what: (p) => `${subject(p)} is NaN, which is no number.`,
    kept: AS_WAS,
    todo: () => 'Write a number, or leave the key out where it may be left out.',
  },
  'number.low': {
    what: (p) =>
      `${subject(p)} is ${shown(p.value)}; it must be ${p.detail?.above === undefined ? `${p.detail?.least} or more` : `above ${p.detail.above}`}.`,
    kept: AS_WAS,
    todo: (p) => String(p.detail?.remedy ?? 'Correct the value.'),
  },
  'number.high': {
    what: (p) =>
      `${subject(p)} is ${shown(p.value)}; it must be ${p.detail?.below === undefined ? `${p.detail?.most} or less` : `below ${p.detail.below}`}.`,
    kept: AS_WAS,
    todo: (p) => String(p.detail?.remedy ?? 'Correct the value, and check its unit.'),
  },
  'number.empty': {
    what: (p) => `${subject(p)} has no number.`,
    kept: READINGS,
    todo: () => 'Give a number.',
  },
  'number.malformed': {
    what: (p) => `${subject(p)}: ${shown(p.value)} is no number.`,
    kept: READINGS,
    todo: () => 'Write a number such as 1.2345 or 1,2345, without its unit.',
  },
  'number.ambiguous': {
    what: (p) => `${subject(p)}: ${shown(p.value)} can be read in two ways, as a thousand or as decimals.`,
    kept: READINGS,
    todo: () => 'Write it without separators of thousands and with a decimal point, or with one more decimal.',
  },
  'number.large': {
    what: (p) => `${subject(p)}: ${shown(p.value)} is larger than any number that can be held.`,
    kept: READINGS,
    todo: () => 'Correct the number.',
  },
  'choice.unknown': {
    what: (p) => `${subject(p)} is ${shown(p.value)}, which it cannot be.${meant(p)}`,
    kept: AS_WAS,
    todo: (p) => `Write one of ${all(p.detail?.choices)}.`,
  },
  'list.empty': {
    what: (p) => `${subject(p)} has no entry.`,
    kept: AS_WAS,
    todo: (p) => `Give one ${p.detail?.of ?? 'entry'} or more, or take the whole away.`,
  },
  'reference.unknown': {
    what: (p) => `${subject(p)} names the ${p.detail?.kind} ${shown(p.value)}, which is not described.${meant(p)}`,
    kept: AS_WAS,
    todo: (p) => `Name a ${p.detail?.kind} of the file, or describe that one.`,
  },
  'name.repeated': {
    what: (p) => `The ${p.detail?.kind} ${shown(p.value)} stands in the list twice, first at ${p.detail?.first}.`,
    kept: AS_WAS,
    todo: () => 'Give each its own name, or take one out.',
  },
  'member.looped': {
    what: (p) => `${subject(p)} is ${shown(p.value)}, where the member begins as well: it leads nowhere.`,
    kept: AS_WAS,
    todo: () => 'Let it end at another node.',
  },
  'member.long': {
    what: (p) => `Member ${p.detail?.member} of frame line ${p.detail?.line} would be ${shown(p.value)} m long.`,
    kept: AS_WAS,
    todo: () => 'Give the coordinates of its nodes in metres; they look like millimetres.',
  },
  'load.beyond': {
    what: (p) =>
      `${subject(p)} is ${shown(p.value)}, beyond the end of the member, which is ${p.detail?.length} m long.`,
    kept: AS_WAS,
    todo: () => 'Give the distance in metres from the node at which the member begins.',
  },
  'base.supportless': {
    what: (p) => `${subject(p)} is given, but the node stands on no support.`,
    kept: AS_WAS,
    todo: () => 'Name its support, or take the base out.',
  },
  'support.shared': {
    what: (p) =>
      `${subject(p)} is ${shown(p.value)}, on which node ${p.detail?.other} of the same frame line stands already.`,
    kept: AS_WAS,
    todo: () => 'Let each node of a line stand on a support of its own.',
  },
  'line.unsupported': {
    what: (p) => `Frame line ${p.detail?.line} stands on no support.`,
    kept: AS_WAS,
    todo: () => 'Name the support of each node at its foot.',
  },
  'support.scaled': {
    what: (p) =>
      `Supports ${list(p.detail?.supports)} are ${p.detail?.plan} m apart in plan and ${p.detail?.along} m in frame line ${p.detail?.line}.`,
    kept: AS_WAS,
    todo: () => 'Give both in metres; one of them looks like millimetres.',
  },
  'triggers.reversed': {
    what: (p) => `Amber ${p.detail?.amber} is above red ${p.detail?.red}.`,
    kept: AS_WAS,
    todo: () => 'Give amber the lower value of the two.',
  },
  'spacings.malformed': {
    what: (p) => `${shown(p.value)} is no spacing.`,
    kept: AS_WAS,
    todo: () => 'Write spacings in metres, as 4 x 6.0, 5.4; with decimal commas, separate them by semicolons.',
  },
  'spacings.ambiguous': {
    what: (p) => `${shown(p.value)} can be read as one number with a decimal comma or as two.`,
    kept: AS_WAS,
    todo: () => 'Write decimals with a point, or separate the spacings by semicolons.',
  },
  'spacings.unusable': {
    what: (p) => `A spacing of ${shown(p.value)} m cannot be laid out.`,
    kept: AS_WAS,
    todo: () => 'Give spacings in metres, above 0 and no more than 1000.',
  },
  'spacings.many': {
    what: (p) => `${shown(p.value)} spacings are more than are laid out at once; ${p.detail?.most} is the most.`,
    kept: AS_WAS,
    todo: () => 'Correct the number before the x.',
  },
  'change.unfit': {
    what: (p) =>
      `${p.element?.id ? `The ${p.element.kind} ${p.element.id}` : 'The description'} is not as it was when the change was made.`,
    kept: 'The building is as it was.',
    todo: () => 'Look at it as it is now, and make the change again.',
  },
  'report.baseline': {
    what: (p) => `Round ${shown(p.value)} has no earlier round to be reported against.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Report another round than the baseline.',
  },
  'project.readonly': {
    what: (p) => `${p.file ?? 'This file'} is a building file and cannot take this change.`,
    kept: 'It is as it was.',
    todo: () => 'Import it into a project first: levelstead import FILE.building.json OUT.levelstead.',
  },
} satisfies Record<string, FaultMessage>
