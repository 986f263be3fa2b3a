/** The commands as a table: what each takes and does. Parsing, checking and the help are made from it. */

export interface OptionForm {
  /** What stands for the value in the help; left out for an option that is on or off. */
  value?: string
  does: string
}

export interface CommandForm {
  needs: readonly string[]
  may: readonly string[]
  options: Record<string, OptionForm>
  does: string
}

const round: OptionForm = { value: 'ID', does: 'only this round; the latest where left out' }

export const COMMANDS = {
  open: {
    needs: [],
    may: ['FILE'],
    options: { browser: { does: "in a window of the local browser instead of the program's own" } },
    does: 'opens the window',
  },
  example: { needs: ['OUT.levelstead'], may: [], options: {}, does: 'writes the example project' },
  import: {
    needs: ['FILE.building.json', 'OUT.levelstead'],
    may: [],
    options: {},
    does: 'makes a project of a building file',
  },
  export: {
    needs: ['FILE.levelstead', 'OUT.building.json'],
    may: [],
    options: {},
    does: 'writes the building file of a project',
  },
  log: {
    needs: ['FILE.levelstead', 'READINGS.csv'],
    may: [],
    options: {},
    does: 'adds the rounds of a readings table to a project',
  },
  assess: {
    needs: ['FILE'],
    may: [],
    options: {
      round: { ...round, does: 'only this round' },
      json: { value: 'OUT', does: 'writes the findings to OUT; - is standard output' },
    },
    does: 'says what the settlement does to the building; FILE is a project or a building file',
  },
  report: {
    needs: ['FILE'],
    may: [],
    options: {
      pdf: { value: 'OUT.pdf', does: 'where the report is written; always needed' },
      round,
      paper: { value: 'A4|Letter', does: 'A4 where left out' },
    },
    does: 'writes the condition report; FILE is a project or a building file',
  },
  verify: { needs: [], may: [], options: {}, does: 'checks the program against published results' },
} as const satisfies Record<string, CommandForm>

export type CommandName = keyof typeof COMMANDS

export function commandForm(name: CommandName): CommandForm {
  return COMMANDS[name]
}

/** One line that shows how the command is written. */
export function usageOf(name: CommandName): string {
  const form = commandForm(name)
  const options = Object.entries(form.options).map(([option, { value }]) => {
    const text = `--${option}${value ? ` ${value}` : ''}`
    return name === 'report' && option === 'pdf' ? text : `[${text}]`
  })
  return ['levelstead', name, ...form.needs, ...form.may.map((word) => `[${word}]`), ...options].join(' ')
}

export function helpOf(name: CommandName): string {
  const form = commandForm(name)
  const rows = Object.entries(form.options).map(
    ([option, { value, does }]) => `  ${`--${option}${value ? ` ${value}` : ''}`.padEnd(22)}${does}`,
  )
  return [`${usageOf(name)}`, '', `  ${form.does}`, ...(rows.length ? ['', ...rows] : []), ''].join('\n')
}

export function helpOfAll(version: string): string {
  const rows = (Object.keys(COMMANDS) as CommandName[]).flatMap((name) => [
    `  ${usageOf(name).slice('levelstead '.length)}`,
    `      ${commandForm(name).does}`,
  ])
  return [
    `Levelstead ${version}: from levelling readings to a cautioned condition report.`,
    '',
    'levelstead COMMAND',
    '',
    ...rows,
    '',
    '  --help, --version',
    '',
    'Exit codes: 0 done; 2 the input cannot be used, nothing was written; 1 a fault of the program.',
    '',
  ].join('\n')
}
