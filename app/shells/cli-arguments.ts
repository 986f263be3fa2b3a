/** Reads a command line against the table of commands; whatever does not fit is a fault that names it. */
import { parseArgs } from 'node:util'
import { Fault, InputFault, type FaultRecord } from '../model/faults.ts'
import { COMMANDS, commandForm, usageOf, type CommandName } from './cli-commands.ts'
import { nearest } from '../model/nearest.ts'

export interface Given {
  command: CommandName
  files: readonly string[]
  options: Readonly<Record<string, string | true>>
}

export type Asked = { ask: 'version' } | { ask: 'help'; command?: CommandName } | ({ ask: 'command' } & Given)

function isCommand(word: string): word is CommandName {
  return Object.hasOwn(COMMANDS, word)
}

function commandOf(word: string): CommandName {
  if (isCommand(word)) return word
  const near = nearest(word, Object.keys(COMMANDS))
  throw new Fault('command.unknown', { value: word, detail: near ? { nearest: near } : {} })
}

/** Throws an InputFault with every misfit of the line. */
export function readArguments(line: readonly string[]): Asked {
  const [first, ...rest] = line
  if (first === undefined || first === '--help' || first === '-h' || first === 'help') {
    const about = rest.find((word) => !word.startsWith('-'))
    return { ask: 'help', ...(about === undefined ? {} : { command: commandOf(about) }) }
  }
  if (first === '--version') return { ask: 'version' }
  const command = commandOf(first)
  if (rest.includes('--help') || rest.includes('-h')) return { ask: 'help', command }
  return { ask: 'command', ...readCommand(command, rest) }
}

function readCommand(command: CommandName, words: readonly string[]): Given {
  const form = commandForm(command)
  const detail = { usage: usageOf(command) }
  const faults: FaultRecord[] = []
  const files: string[] = []
  const options: Record<string, string | true> = {}
  const { tokens } = parseArgs({
    args: [...words],
    strict: false,
    allowPositionals: true,
    tokens: true,
    options: Object.fromEntries(
      Object.entries(form.options).map(([name, { value }]) => [name, { type: value ? 'string' : 'boolean' }] as const),
    ),
  })
  for (const token of tokens) {
    if (token.kind === 'positional') files.push(token.value)
    if (token.kind !== 'option') continue
    const option = Object.hasOwn(form.options, token.name) ? form.options[token.name] : undefined
    if (!option) {
      const near = nearest(token.name, Object.keys(form.options))
      const place = { value: token.rawName, detail: { ...detail, ...(near ? { nearest: `--${near}` } : {}) } }
      faults.push({ code: 'option.unknown', place })
    } else if (token.name in options) faults.push({ code: 'option.repeated', place: { value: token.rawName } })
    else if (!option.value && token.value !== undefined)
      faults.push({ code: 'option.surplus', place: { path: token.rawName, value: token.value } })
    // Another option where a value should stand: the value was forgotten.
    else if (option.value && (!token.value || (!token.inlineValue && /^-./.test(token.value))))
      faults.push({ code: 'option.valueless', place: { value: token.rawName, detail } })
    else options[token.name] = token.value ?? true
  }
  for (const word of form.needs.slice(files.length))
    faults.push({ code: 'argument.missing', place: { value: `levelstead ${command}`, path: word, detail } })
  // What follows a misspelt option is its value, most likely.
  const isMisspelt = faults.some((fault) => fault.code === 'option.unknown')
  for (const file of isMisspelt ? [] : files.slice(form.needs.length + form.may.length))
    faults.push({ code: 'argument.surplus', place: { value: file, detail } })
  if (command === 'report' && options.pdf === undefined && !faults.some((f) => f.place.value === '--pdf'))
    faults.push({ code: 'argument.missing', place: { value: 'levelstead report', path: '--pdf OUT.pdf', detail } })
  if (options.paper !== undefined && options.paper !== 'A4' && options.paper !== 'Letter')
    faults.push({ code: 'paper.unknown', place: { path: '--paper', value: options.paper } })
  if (faults.length) throw new InputFault(faults)
  return { command, files, options }
}
