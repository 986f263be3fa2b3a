/**
 * The one table of requests: what each takes, what it gives, whether it writes. Every door (window in
 * Electron, window in the browser, command line) goes through it. The window imports it with `import type`
 * only, so that the validator is not in its bundle.
 */
import * as v from 'valibot'
import type { Edit } from '../model/changes.ts'
import type { Findings } from '../model/findings.ts'
import type {
  AboutView,
  ExportedView,
  FolderView,
  ImportedView,
  IssuedReportView,
  PdfView,
  ProjectView,
  VerifyRow,
} from './views.ts'

/** Marks the type of an answer; it has no value at run time. */
function gives<T>(): { answer?: T } {
  return {}
}

const text = v.pipe(v.string(), v.maxLength(10_000))
const name = v.pipe(v.string(), v.minLength(1), v.maxLength(200))
const path = v.pipe(v.string(), v.minLength(1), v.maxLength(4096), v.excludes('\0'))
const reason = v.pipe(v.string(), v.trim(), v.maxLength(2000))
const nothing = v.strictObject({})

/** Entities and readings are checked by the reader of building files, which names every fault by its path. */
const edit = v.strictObject({
  what: name,
  changes: v.pipe(v.array(v.looseObject({ kind: v.string() })), v.maxLength(100_000)),
})
/** A round as it is typed: where a cell is no number yet, its text stands in the number's place. */
export interface TypedRound {
  id: string
  date: string
  levels?: readonly object[]
  book?: {
    rows: readonly object[]
    sd_mm_per_sqrt_km?: unknown
    sd_mm_per_setup?: unknown
    collimation_mm_per_10_m?: unknown
  }
  observer?: string
  instrument?: string
  weather?: string
  note?: string
}

const rows = v.pipe(v.array(v.custom<object>((row) => typeof row === 'object' && row !== null)), v.maxLength(100_000))
const book = v.custom<NonNullable<TypedRound['book']>>((value) => v.is(v.looseObject({ rows }), value))
/** What is typed of a round is kept whole or not: only what the window must be able to show again is held to a form. */
const draft = v.looseObject({
  id: name,
  date: v.pipe(v.string(), v.maxLength(200)),
  levels: v.optional(rows),
  book: v.optional(book),
  observer: v.optional(text),
  instrument: v.optional(text),
  weather: v.optional(text),
  note: v.optional(text),
})
const names = { surveyed_by: text, assessed_by: text, reviewer: text }
const reportOptions = v.strictObject({ ...names, round: name, paper: v.picklist(['A4', 'Letter']) })

export const requests = {
  'about/view': { takes: nothing, ...gives<AboutView>(), writes: false },
  'files/list': { takes: v.strictObject({ folder: v.optional(path) }), ...gives<FolderView>(), writes: false },

  'project/new': { takes: v.strictObject({ path, name }), ...gives<ProjectView>(), writes: false },
  'project/open': { takes: v.strictObject({ path }), ...gives<ProjectView>(), writes: false },
  'project/example': { takes: v.strictObject({ path }), ...gives<ProjectView>(), writes: false },
  'project/close': { takes: nothing, ...gives<null>(), writes: false },
  'project/view': { takes: nothing, ...gives<ProjectView | null>(), writes: false },
  'project/duplicate': { takes: v.strictObject({ path }), ...gives<ProjectView>(), writes: false },
  'project/undo': { takes: nothing, ...gives<ProjectView>(), writes: true },
  'project/redo': { takes: nothing, ...gives<ProjectView>(), writes: true },

  'describe/edit': { takes: edit, ...gives<ProjectView>(), writes: true },

  'rounds/draft': { takes: draft, ...gives<ProjectView>(), writes: true },
  'rounds/discard': { takes: v.strictObject({ round: name }), ...gives<ProjectView>(), writes: true },
  'rounds/accept': {
    takes: v.strictObject({ round: name, note: v.optional(text) }),
    ...gives<ProjectView>(),
    writes: true,
  },
  'rounds/correct': { takes: v.strictObject({ round: draft, reason }), ...gives<ProjectView>(), writes: true },
  'rounds/baseline': { takes: v.strictObject({ round: name, reason }), ...gives<ProjectView>(), writes: true },

  'assess/findings': { takes: v.strictObject({ round: v.optional(name) }), ...gives<Findings>(), writes: false },

  'exchange/import': { takes: v.strictObject({ from: path, to: path }), ...gives<ProjectView>(), writes: false },
  'exchange/export': {
    takes: v.strictObject({ to: path, replace: v.optional(v.boolean()) }),
    ...gives<ExportedView>(),
    writes: false,
  },
  'exchange/readings': { takes: v.strictObject({ to: path }), ...gives<{ written: string[] }>(), writes: false },
  'exchange/log': { takes: v.strictObject({ from: path }), ...gives<ImportedView>(), writes: true },

  'report/preview': { takes: reportOptions, ...gives<PdfView>(), writes: false },
  'report/issue': { takes: reportOptions, ...gives<IssuedReportView>(), writes: false },
  'report/register': { takes: nothing, ...gives<IssuedReportView[]>(), writes: false },
  'report/pdf': {
    takes: v.strictObject({ number: v.pipe(v.number(), v.integer(), v.minValue(1)) }),
    ...gives<PdfView>(),
    writes: false,
  },
  'report/save': {
    takes: v.strictObject({ number: v.pipe(v.number(), v.integer(), v.minValue(1)), to: path }),
    ...gives<{ written: string }>(),
    writes: false,
  },

  'verify/run': { takes: nothing, ...gives<VerifyRow[]>(), writes: false },
} as const satisfies Record<string, { takes: v.GenericSchema; answer?: unknown; writes: boolean }>

export type RequestName = keyof typeof requests
/** What is more narrowly typed than its validator can say. */
interface Typed {
  'describe/edit': Edit
  'rounds/draft': TypedRound
  'rounds/correct': { round: TypedRound; reason: string }
}
export type Input<K extends RequestName> = K extends keyof Typed
  ? Typed[K]
  : v.InferOutput<(typeof requests)[K]['takes']>
export type Answer<K extends RequestName> = (typeof requests)[K] extends { answer?: infer A }
  ? Exclude<A, undefined>
  : never
