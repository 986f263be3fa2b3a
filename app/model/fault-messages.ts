/** The catalogue of fault sentences by code. A test goes through all codes and fails on a missing one. */
import { list, NOTHING_WRITTEN, shown, subject, type FaultMessage } from './fault-words.ts'
import { inputMessages } from './input-messages.ts'
import { readingsMessages } from './readings-messages.ts'
import { projectMessages } from './project-messages.ts'

export { shown, type FaultMessage } from './fault-words.ts'

export const catalogue = {
  ...inputMessages,
  ...readingsMessages,
  ...projectMessages,
  'argument.missing': {
    what: (p) => `${shown(p.value)} needs ${p.path ?? 'a file'}.`,
    kept: NOTHING_WRITTEN,
    todo: (p) => `Write it as: ${p.detail?.usage ?? 'levelstead --help'}`,
  },
  'argument.surplus': {
    what: (p) => `${shown(p.value)} is one argument too many.`,
    kept: NOTHING_WRITTEN,
    todo: (p) => `Write it as: ${p.detail?.usage ?? 'levelstead --help'}`,
  },
  'book.sdless': {
    what: (p) =>
      `Round ${p.detail?.round}: no standard deviation of the instrument is given, neither for a kilometre nor for a setup.`,
    kept: 'The readings are as they were.',
    todo: () => 'Give one of the two; the levels can be reduced without it, but not adjusted.',
  },
  'book.unopened': {
    what: (p) => `Round ${p.detail?.round}, row ${p.detail?.row}: ${p.detail?.point} is read before any backsight.`,
    kept: 'The readings are as they were.',
    todo: () => 'Book the backsight with which the first setup begins above it.',
  },
  'command.unknown': {
    what: (p) =>
      `There is no command ${shown(p.value)}${p.detail?.nearest ? `; the nearest is ${shown(p.detail.nearest)}` : ''}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Ask for the list of commands with --help.',
  },
  'disk.full': {
    what: (p) => `There is no room left to write ${shown(p.file)}.`,
    kept: 'What stood under that name is as it was.',
    todo: () => 'Free some space, or write to another disk.',
  },
  'element.unknown': {
    what: (p) => `There is no ${p.element?.kind ?? 'element'} ${shown(p.value)} in these findings.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Choose one of those that the findings list.',
  },
  'file.busy': {
    what: (p) => `${shown(p.file)} is in use by another program.`,
    kept: 'It is as it was.',
    todo: () =>
      'Close it there (a viewer, a virus scanner or a program that keeps folders in step may hold it), then try again.',
  },
  'file.exists': {
    what: (p) => `${shown(p.file)} exists already.`,
    kept: 'It is as it was.',
    todo: () => 'Choose another name, or move that file away first.',
  },
  'file.folder': {
    what: (p) => `${shown(p.file)} is a folder, not a file.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Name a file.',
  },
  'file.large': {
    what: (p) =>
      `${p.file === undefined ? 'The file' : shown(p.file)} is too large to be one of ours: ${shown(p.value)} bytes${p.detail?.most === undefined ? '' : `; ${p.detail.most} is the most that is read`}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Check that this is the right file.',
  },
  'file.missing': {
    what: (p) => `There is no file ${shown(p.file)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Check the name and the folder.',
  },
  'file.unreadable': {
    what: (p) => `${shown(p.file)} cannot be read${p.detail?.reason ? ` (${String(p.detail.reason)})` : ''}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Check that you may read it and that its disk is there.',
  },
  'file.unwritable': {
    what: (p) => `${shown(p.file)} cannot be written${p.detail?.reason ? ` (${String(p.detail.reason)})` : ''}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Check that you may write there, or choose another folder.',
  },
  'folder.missing': {
    what: (p) => `The folder of ${shown(p.file)} does not exist.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Make the folder first, or choose another.',
  },
  'frame.baseless': {
    what: (p) => `Frame line ${p.detail?.line} stands on support ${shown(p.value)}, which is not described.`,
    kept: 'The description is as it was.',
    todo: () => 'Describe that support, or let the node stand on another.',
  },
  'frame.mechanism': {
    what: (p) => `Frame line ${p.detail?.line} can move freely at ${list(p.detail?.nodes)}: it is a mechanism.`,
    kept: 'The description is as it was.',
    todo: () => 'Take out a pin, add a member, or fix a base there.',
  },
  'frame.unsupported': {
    what: (p) => `Frame line ${p.detail?.line}: ${list(p.detail?.nodes)} hang on no support.`,
    kept: 'The description is as it was.',
    todo: () => 'Join them by members to a support, or take them away.',
  },
  'frame.unusable': {
    what: (p) => `Frame line ${p.detail?.line} cannot be solved: ${shown(p.value)} is not a usable value.`,
    kept: 'The description is as it was.',
    todo: () => 'Correct the values of its nodes, supports and bases.',
  },
  'grid.large': {
    what: (p) =>
      `The grid would have ${shown(p.value)} supports; ${p.detail?.most ?? 2000} is the most laid out at once.`,
    kept: 'The building is as it was.',
    todo: () => 'Correct the spacings.',
  },
  'line.short': {
    what: (p) => `Frame line ${shown(p.element?.id)} has fewer than two supports.`,
    kept: 'The building is as it was.',
    todo: () => 'Pick two supports or more.',
  },
  'line.storeyless': {
    what: (p) => `Frame line ${shown(p.element?.id)} has no storey.`,
    kept: 'The building is as it was.',
    todo: () => 'Give one storey height or more, in metres, as 3.5, 2 x 3.2.',
  },
  'member.incomplete': {
    what: (p) =>
      `Member ${p.detail?.member} of frame line ${p.detail?.line} names the ${p.detail?.kind} ${shown(p.value)}, which is not described.`,
    kept: 'The description is as it was.',
    todo: (p) => `Describe that ${p.detail?.kind}, or give the member another.`,
  },
  'member.lengthless': {
    what: (p) => `Member ${p.detail?.member} of frame line ${p.detail?.line} has no length.`,
    kept: 'The description is as it was.',
    todo: () => 'Move one of its nodes, or take it away.',
  },
  'member.unusable': {
    what: (p) =>
      `Member ${p.detail?.member} of frame line ${p.detail?.line} cannot be solved: its ${shown(p.value)} is not a usable value.`,
    kept: 'The description is as it was.',
    todo: () => 'Correct its section and loads.',
  },
  'name.empty': {
    what: (p) =>
      p.path === undefined
        ? `The ${p.element?.kind ?? 'thing'} has no name.`
        : `${subject(p)} is blank where a name must stand.`,
    kept: 'The building is as it was.',
    todo: () => 'Give it a name.',
  },
  'name.taken': {
    what: (p) => `There is a ${p.element?.kind ?? 'thing'} named ${shown(p.value)} already.`,
    kept: 'The building is as it was.',
    todo: () => 'Choose another name.',
  },
  'option.repeated': {
    what: (p) => `The option ${String(p.value)} is given twice.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Give it once.',
  },
  'option.surplus': {
    what: (p) => `The option ${String(p.path)} takes no value, and was given ${shown(p.value)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Leave the value out.',
  },
  'option.unknown': {
    what: (p) =>
      `There is no option ${String(p.value)}${p.detail?.nearest ? `; the nearest is ${String(p.detail.nearest)}` : ''}.`,
    kept: NOTHING_WRITTEN,
    todo: (p) => `Write it as: ${p.detail?.usage ?? 'levelstead --help'}`,
  },
  'option.valueless': {
    what: (p) => `The option ${String(p.value)} needs a value.`,
    kept: NOTHING_WRITTEN,
    todo: (p) => `Write it as: ${p.detail?.usage ?? 'levelstead --help'}`,
  },
  'paper.unknown': {
    what: (p) => `There is no paper ${shown(p.value)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Use A4 or Letter.',
  },
  'point.read': {
    what: (p) => `${shown(p.value)} was read in ${list(p.detail?.rounds)}, so it keeps its name and stays.`,
    kept: 'The building and its readings are as they were.',
    todo: () => 'Add another point if the next rounds read a new one.',
  },
  'request.malformed': {
    what: (p) => `The request is not of its form${p.path ? ` at ${p.path}` : ''}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Send what the request takes.',
  },
  'request.unknown': {
    what: (p) => `There is no request named ${shown(p.value)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Use one of the requests of this version.',
  },
  'round.baseless': {
    what: (p) => `Round ${p.detail?.round} has no baseline to be counted from.`,
    kept: 'The readings are as they were.',
    todo: () => 'Choose the round that all settlements are counted from.',
  },
  'round.unknown': {
    what: (p) => `There is no round ${shown(p.value)}.`,
    kept: NOTHING_WRITTEN,
    todo: () => 'Name one of the rounds of the building.',
  },
  'round.unmeasured': {
    what: (p) =>
      `Round ${p.detail?.round} gives the settlement of no support: none of its studs is in the baseline, nor joined to it.`,
    kept: 'The readings are as they were.',
    todo: () => 'Read at least one stud that the baseline has, or choose another baseline.',
  },
  'round.untied': {
    what: (p) => `In round ${p.element?.id} no chain of readings joins ${list(p.detail?.points)} to a benchmark.`,
    kept: 'The readings are as they were.',
    todo: () => 'Book the readings that join them, or give the level of a benchmark that was read.',
  },
  'row.pointless': {
    what: (p) => `Row ${p.detail?.row} names no point.`,
    kept: 'The readings are as they were.',
    todo: () => 'Name the point that was read.',
  },
  'row.readingless': {
    what: (p) => `Row ${p.detail?.row}, ${p.detail?.point}: no staff reading is booked.`,
    kept: 'The readings are as they were.',
    todo: () => 'Book the reading, or take the row away.',
  },
  'row.unusable': {
    what: (p) => `Row ${p.detail?.row}, ${p.detail?.point}: ${shown(p.value)} is no length or reading.`,
    kept: 'The readings are as they were.',
    todo: () => 'Write it as a number in metres.',
  },
  'section.none': {
    what: (p) => `Frame line ${shown(p.element?.id)} has no section to give the member.`,
    kept: 'The building is as it was.',
    todo: () => 'Add a section first.',
  },
  'section.used': {
    what: (p) => `Section ${shown(p.value)} is that of ${list(p.detail?.members)}.`,
    kept: 'The building is as it was.',
    todo: () => 'Give those members another section first.',
  },
  'sight.lengthless': {
    what: (p) =>
      `Round ${p.detail?.round}, row ${p.detail?.row}: the sight to ${p.detail?.point} has no length, or the instrument a standard deviation of zero.`,
    kept: 'The readings are as they were.',
    todo: () => 'Book the length of the sight above zero, and the standard deviation of the instrument.',
  },
  'sight.missing': {
    what: (p) =>
      `Round ${p.detail?.round}, row ${p.detail?.row}: the length of the sight to ${p.detail?.point} is not booked.`,
    kept: 'The readings are as they were.',
    todo: () => 'Book it, or give the standard deviation of a setup instead of that of a kilometre.',
  },
  'support.read': {
    what: (p) =>
      `Support ${shown(p.value)} carries ${p.detail?.point ?? 'a stud'}, which was read in ${list(p.detail?.rounds)}.`,
    kept: 'The building and its readings are as they were.',
    todo: () => 'Leave the support; strike out the members that stand on it.',
  },
  'work.stopped': {
    what: () => 'The work was stopped.',
    kept: NOTHING_WRITTEN,
    todo: () => 'Start it again when you want its result.',
  },
} satisfies Record<string, FaultMessage>

export type FaultCode = keyof typeof catalogue
