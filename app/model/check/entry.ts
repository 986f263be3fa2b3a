/**
 * One object of a file, read key by key. What does not fit is noted with its path and read as NaN or as an empty
 * text, so that reading goes on to the next key; nothing that was read leaves the reader once a fault is noted.
 */
import type { ElementRef, FaultCode, Place } from '../faults.ts'
import { pathStep } from '../json-text.ts'
import { parseNumber } from '../numbers.ts'
import type { FaultsFound } from './faults-found.ts'

/** What a number may be; `remedy` says what to do where it is not. */
export interface NumberRule {
  above?: number
  least?: number
  below?: number
  most?: number
  remedy?: string
}

type Detail = NonNullable<Place['detail']>

export class Entry {
  readonly path: string
  /** What a fault of this entry stands beside in the window; set once the entry's name is read. */
  element: ElementRef | undefined
  readonly faults: FaultsFound
  private readonly raw: Readonly<Record<string, unknown>>
  /** Keys that stand there under a name not quite theirs: told once, and not as missing also. */
  private readonly misspelt = new Set<string>()

  private constructor(
    faults: FaultsFound,
    path: string,
    raw: Readonly<Record<string, unknown>>,
    element: ElementRef | undefined,
  ) {
    this.faults = faults
    this.path = path
    this.raw = raw
    this.element = element
  }

  /** The value as an entry with these keys; undefined, and noted, where it is no object. */
  static of(
    faults: FaultsFound,
    path: string,
    value: unknown,
    keys: readonly string[],
    element?: ElementRef,
  ): Entry | undefined {
    if (typeof value !== 'object' || value === null || Array.isArray(value)) {
      faults.add('value.unfit', {
        path,
        value,
        ...(element && { element }),
        detail: { wanted: 'an object with named values in braces' },
      })
      return undefined
    }
    const entry = new Entry(faults, path, value as Record<string, unknown>, element)
    for (const key of Object.keys(value)) {
      if (keys.includes(key) || !entry.has(key)) continue
      const free = keys.filter((known) => !entry.has(known))
      const near = faults.nearest(key, free)
      if (near.nearest !== undefined) entry.misspelt.add(near.nearest)
      entry.fault('key.unknown', key, { key, keys, ...near })
    }
    return entry
  }

  at(key: string): string {
    return pathStep(this.path, key)
  }

  /** A key of a value in memory that holds undefined is not there, as in the file that it would be written to. */
  has(key: string): boolean {
    return Object.hasOwn(this.raw, key) && this.raw[key] !== undefined
  }

  value(key: string): unknown {
    return this.has(key) ? this.raw[key] : undefined
  }

  /** Notes a fault at a key, with the value that stands there. */
  fault(code: FaultCode, key: string, detail?: Detail): void {
    const value = this.has(key) ? { value: this.raw[key] } : {}
    this.faults.add(code, {
      path: this.at(key),
      ...value,
      ...(this.element && { element: this.element }),
      ...(detail && { detail }),
    })
  }

  /** A name that others refer to. */
  name(key: string): string {
    const name = this.neededText(key, 'a name in quotes')
    if (name?.trim() === '') this.fault('name.empty', key)
    return name ?? ''
  }

  neededText(key: string, wanted: string): string | undefined {
    return this.required(key, wanted) ? this.textOf(key, wanted) : undefined
  }

  text(key: string): string | undefined {
    return this.has(key) ? this.textOf(key, 'text in quotes') : undefined
  }

  number(key: string, rule: NumberRule = {}): number {
    return this.required(key, 'a number') ? this.numberOf(key, rule) : NaN
  }

  maybeNumber(key: string, rule: NumberRule = {}): number | undefined {
    return this.has(key) ? this.numberOf(key, rule) : undefined
  }

  flag(key: string): boolean | undefined {
    if (!this.has(key)) return undefined
    const value = this.raw[key]
    if (typeof value === 'boolean') return value
    this.fault('value.unfit', key, { wanted: 'true or false, without quotes' })
    return undefined
  }

  choice<T extends string>(key: string, choices: readonly T[]): T {
    const [first] = choices
    const wanted = choices.map((choice) => `"${choice}"`).join(' or ')
    if (!this.required(key, wanted)) return first!
    const value = this.raw[key]
    const chosen = choices.find((choice) => choice === value)
    if (chosen === undefined) this.fault('choice.unknown', key, { choices, ...this.faults.nearest(value, choices) })
    return chosen ?? first!
  }

  /** Every entry of a list, read with its path; the list itself must be there. */
  list<T>(key: string, read: (value: unknown, path: string) => T): T[] {
    if (!this.required(key, 'a list; [] where there is none')) return []
    const value = this.raw[key]
    if (Array.isArray(value)) return value.map((item, i) => read(item, `${this.at(key)}[${i}]`))
    this.fault('value.unfit', key, { wanted: 'a list in square brackets' })
    return []
  }

  /** The object at a key; undefined where it is missing or does not fit. */
  entry(key: string, keys: readonly string[], need?: 'needed'): Entry | undefined {
    if (need ? !this.required(key, 'an object with named values in braces') : !this.has(key)) return undefined
    return Entry.of(this.faults, this.at(key), this.raw[key], keys, this.element)
  }

  /** A name that must be one of those described. */
  reference(key: string, kind: string, known: { has(id: string): boolean; keys(): Iterable<string> }): string {
    const name = this.name(key)
    if (name.trim() !== '' && !known.has(name))
      this.fault('reference.unknown', key, { kind, ...this.faults.nearest(name, known.keys()) })
    return name
  }

  private required(key: string, wanted: string): boolean {
    if (this.has(key)) return true
    if (!this.misspelt.has(key)) this.fault('key.missing', key, { wanted })
    return false
  }

  private textOf(key: string, wanted: string): string | undefined {
    const value = this.raw[key]
    if (typeof value === 'string') return value
    this.fault('value.unfit', key, { wanted })
    return undefined
  }

  private numberOf(key: string, rule: NumberRule): number {
    const value = this.raw[key]
    if (typeof value === 'string') {
      const parsed = parseNumber(value)
      this.fault('number.quoted', key, parsed.ok ? { number: String(parsed.value) } : undefined)
      return NaN
    }
    if (typeof value !== 'number') {
      this.fault('value.unfit', key, { wanted: 'a number' })
      return NaN
    }
    if (Number.isNaN(value)) this.fault('number.undefined', key)
    else if (!Number.isFinite(value)) this.fault('number.infinite', key)
    else {
      const beyond = beyondRule(value, rule)
      if (!beyond) return value + 0 // minus zero is zero
      this.fault(
        beyond.code,
        key,
        rule.remedy === undefined ? beyond.detail : { ...beyond.detail, remedy: rule.remedy },
      )
    }
    return NaN
  }
}

/** The bound that a number breaks. */
function beyondRule(
  value: number,
  { above, least, below, most }: NumberRule,
): { code: 'number.low' | 'number.high'; detail: Record<string, number> } | undefined {
  if (above !== undefined && value <= above) return { code: 'number.low', detail: { above } }
  if (least !== undefined && value < least) return { code: 'number.low', detail: { least } }
  if (below !== undefined && value >= below) return { code: 'number.high', detail: { below } }
  if (most !== undefined && value > most) return { code: 'number.high', detail: { most } }
  return undefined
}

/** Notes every name that stands in its list a second time. `paths` are those of the names. */
export function noteRepeated(
  faults: FaultsFound,
  kind: ElementRef['kind'],
  names: readonly { id: string; path: string }[],
  within?: string,
): void {
  const first = new Map<string, string>()
  for (const { id, path } of names) {
    if (id.trim() === '') continue
    const before = first.get(id)
    if (before === undefined) first.set(id, path)
    else {
      const element: ElementRef = within === undefined ? { kind, id } : { kind, id, within }
      faults.add('name.repeated', {
        path,
        value: id,
        element,
        detail: { kind: kind === 'line' ? 'frame line' : kind, first: before },
      })
    }
  }
}
