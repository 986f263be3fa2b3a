/**
 * The command line. Every command goes through the same dispatch as the window; a building file is asked the same
 * requests as a project, as a project that lives in memory. What is printed is made from what the window gets.
 */
import type { Answer, Input, RequestName } from '../contract/requests.ts'
import type { Envelope } from '../contract/wire.ts'
import { criteriaOf } from '../model/building.ts'
import { errorLine } from '../model/fault-line.ts'
import { Fault, faultsOf, InputFault } from '../model/faults.ts'
import { soundBuilding } from '../usecases/exchange.ts'
import { dispatch } from '../usecases/handlers.ts'
import type { Context, Projects, Session } from '../usecases/ports.ts'
import { intervalFactor } from '../assess/confidence.ts'
import { summary } from './assess-summary.ts'
import { buildingProject } from './building-project.ts'
import { readArguments, type Given } from './cli-arguments.ts'
import { helpOf, helpOfAll, type CommandName } from './cli-commands.ts'
import { loadProjects, nodeContext, programVersion } from './context.ts'
import { print, tell, tellFaults } from './terminal.ts'

/** A bug of the program, as it came through the envelope. */
class Bug extends Error {}

/** Runs a command; gives the exit code: 0 done, 2 the input cannot be used, 1 a fault of the program. */
export async function runCommandLine(words: readonly string[]): Promise<number> {
  try {
    const asked = readArguments(words)
    if (asked.ask === 'version') print(programVersion())
    else if (asked.ask === 'help') print(asked.command ? helpOf(asked.command) : helpOfAll(programVersion()))
    else return await COMMAND[asked.command](asked)
    return 0
  } catch (error) {
    const faults = faultsOf(error)
    if (faults) {
      tellFaults(faults)
      return 2
    }
    tell(`Levelstead itself failed: ${error instanceof Error ? error.message : String(error)}`)
    tell('The files are as they were. Set LEVELSTEAD_STACK=1 and try again to see where it failed.')
    if (process.env.LEVELSTEAD_STACK && error instanceof Error) tell(error.stack ?? '')
    return 1
  }
}

const COMMAND: Record<CommandName, (given: Given) => Promise<number>> = {
  async open({ files: [file], options }) {
    const { openWindow } = await import('./start-window.ts')
    return openWindow({ ...(file === undefined ? {} : { file }), browser: options.browser === true })
  },

  async example({ files: [out] }) {
    const { ask, close } = await desk()
    const view = await ask('project/example', { path: out! })
    close()
    print(`Wrote ${out!}: ${view.building.name}, ${view.rounds.length} rounds.`)
    return 0
  },

  async import({ files: [from, to] }) {
    const { ask, close } = await desk()
    const { building } = await ask('exchange/import', { from: from!, to: to! })
    close()
    const { supports, frame_lines, survey } = building
    print(
      `Wrote ${to!}: ${building.name}, ${supports.length} supports, ${frame_lines.length} frame lines, ${survey.rounds.length} rounds.`,
    )
    return 0
  },

  async export({ files: [file, out] }) {
    const { ask, close } = await opened(file!)
    const { drafts, unfinished } = await ask('exchange/export', { to: out!, replace: true })
    close()
    print(`Wrote ${out!}.`)
    if (drafts.length) tell(`Left out, not accepted yet: ${drafts.join(', ')}.`)
    if (unfinished.length) {
      tell('The description is unfinished; before the file can be imported again:')
      for (const fault of unfinished) tell(errorLine(fault, out).replace('error', 'unfinished'))
    }
    return 0
  },

  async log({ files: [file, readings] }) {
    const { ask, close } = await opened(file!)
    const { added, columns, notes } = await ask('exchange/log', { from: readings! })
    close()
    print(`Added to ${file!}: ${added.join(', ')}.`)
    const taken = Object.entries(columns ?? {}).map(([column, meaning]) => `${column} as ${meaning}`)
    if (taken.length) tell(`Columns: ${taken.join(', ')}.`)
    for (const note of notes ?? []) tell(note)
    return 0
  },

  async assess({ files: [file], options }) {
    const { ask, context, close } = await opened(file!)
    const findings = await ask('assess/findings', typeof options.round === 'string' ? { round: options.round } : {})
    const { confidence } = criteriaOf(context.session.project!.read.building())
    const json = options.json
    if (typeof json === 'string') {
      const text = `${JSON.stringify(findings, null, 2)}\n`
      if (json === '-') print(text)
      else writeResult(context, json, text)
    }
    close()
    const text = summary(findings, intervalFactor(confidence))
    if (json === '-') tell(text)
    else print(text)
    if (typeof json === 'string' && json !== '-') tell(`Wrote ${json}.`)
    return 0
  },

  async report({ files: [file], options }) {
    const { ask, context, close } = await opened(file!)
    const round = typeof options.round === 'string' ? options.round : latestRound(context)
    const { pdf, pages } = await ask('report/preview', {
      round,
      paper: options.paper === 'Letter' ? 'Letter' : 'A4',
      surveyed_by: '',
      assessed_by: '',
      reviewer: '',
    })
    writeResult(context, options.pdf as string, Buffer.from(pdf, 'base64'))
    close()
    print(`Wrote ${options.pdf as string}: round ${round}, ${pages} pages.`)
    tell('A draft for review, not entered in the register; issue it in the window to give it a number.')
    return 0
  },

  async verify() {
    const { ask } = await desk({ withProjects: false })
    const rows = await ask('verify/run', {})
    for (const { agrees, check, expected, found, unit, source } of rows)
      print(
        `${agrees ? 'agrees   ' : 'DISAGREES'}  ${check}: expected ${figure(expected)}, found ${figure(found)}${unit ? ` ${unit}` : ''}\n           ${source}`,
      )
    const wrong = rows.filter((row) => !row.agrees).length
    print(`${rows.length - wrong} of ${rows.length} checks agree.`)
    return wrong ? 1 : 0
  },
}

function figure(value: number): string {
  return String(Number(value.toPrecision(7)))
}

interface Desk {
  context: Context
  ask<K extends RequestName>(name: K, input: Input<K>): Promise<Answer<K>>
  close(): void
}

/** No database is loaded where no project file is touched. */
async function desk({ withProjects = true } = {}): Promise<Desk> {
  const session: Session = { project: null }
  const projects = withProjects ? await loadProjects() : noProjects
  const context = nodeContext({ shell: 'command line', projects, session })
  return {
    context,
    async ask(name, input) {
      const envelope = (await dispatch(name, input, context)) as Envelope<Answer<typeof name>>
      if (envelope.ok) return envelope.value
      if ('faults' in envelope) throw new InputFault(envelope.faults)
      throw Object.assign(new Bug(envelope.bug.message), { stack: envelope.bug.stack })
    },
    close: () => session.project?.close(),
  }
}

const noProjects: Projects = {
  create: refuse,
  open: refuse,
  duplicate: refuse,
}

function refuse(): never {
  throw new Error('this command opens no project')
}

/** Results of an earlier run are written over; a project or a building file never is: it is somebody's work. */
function writeResult({ files }: Context, path: string, bytes: Uint8Array | string): void {
  if (files.exists(path)) {
    const head = Buffer.from(files.readBytes(path).subarray(0, 200)).toString('latin1')
    if (head.startsWith('SQLite format 3') || /^\s*\{\s*"format"\s*:\s*"levelstead-building"/.test(head))
      throw new Fault('file.exists', { file: path })
  }
  files.writeBytes(path, bytes)
}

/** A project or a building file, told apart by its first bytes. */
async function opened(file: string): Promise<Desk> {
  const { nodeFiles } = await import('./node-files.ts')
  const bytes = nodeFiles().readBytes(file)
  const isProject = Buffer.from(bytes.subarray(0, 15)).toString('latin1') === 'SQLite format 3'
  if (isProject || /\.levelstead$/i.test(file)) {
    const found = await desk()
    await found.ask('project/open', { path: file })
    return found
  }
  const found = await desk({ withProjects: false })
  found.context.session.project = buildingProject(file, soundBuilding(bytes, file))
  return found
}

/** The last round by date that is not the baseline. */
function latestRound(context: Context): string {
  const { baseline, rounds } = context.session.project!.read.building().survey
  const others = rounds
    .filter((r) => r.id !== baseline)
    .sort((a, b) => (a.date < b.date ? -1 : a.date > b.date ? 1 : 0))
  const last = others.at(-1)
  if (!last) throw new Fault('report.baseline', { value: baseline ?? 'none' })
  return last.id
}
