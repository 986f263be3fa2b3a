/**
 * The only way in. Looks a request up, holds what came with it to its form, hands a transaction to those that
 * write, and answers with an envelope: a value, the faults of the input, or a bug of the program.
 */
import * as v from 'valibot'
import { requests, type Answer, type Input, type RequestName } from '../contract/requests.ts'
import type { Envelope } from '../contract/wire.ts'
import { Fault, faultsOf } from '../model/faults.ts'
import { findings, verify } from './assess-round.ts'
import { edit } from './describe.ts'
import { exportBuilding, exportReadings, importBuilding, logReadings } from './exchange.ts'
import type { Context, WriteStore } from './ports.ts'
import {
  aboutView,
  close,
  duplicate,
  exampleProject,
  listFolder,
  newProject,
  open,
  redo,
  undo,
  view,
} from './project.ts'
import { openProject } from './project-view.ts'
import { issue, issuedPdf, preview, register, savePdf } from './reports.ts'
import { accept, correct, discard, saveDraft, setBaseline } from './rounds.ts'

type Writes = { [K in RequestName]: (typeof requests)[K]['writes'] extends true ? K : never }[RequestName]

export type Handlers = {
  [K in RequestName]: K extends Writes
    ? (input: Input<K>, context: Context, store: WriteStore) => Answer<K>
    : (input: Input<K>, context: Context) => Answer<K> | Promise<Answer<K>>
}

const handlers: Handlers = {
  'about/view': aboutView,
  'files/list': listFolder,
  'project/new': newProject,
  'project/open': open,
  'project/example': exampleProject,
  'project/close': close,
  'project/view': view,
  'project/duplicate': duplicate,
  'project/undo': undo,
  'project/redo': redo,
  'describe/edit': edit,
  'rounds/draft': saveDraft,
  'rounds/discard': discard,
  'rounds/accept': accept,
  'rounds/correct': correct,
  'rounds/baseline': setBaseline,
  'assess/findings': findings,
  'exchange/import': importBuilding,
  'exchange/export': exportBuilding,
  'exchange/readings': exportReadings,
  'exchange/log': logReadings,
  'report/preview': preview,
  'report/issue': issue,
  'report/register': register,
  'report/pdf': issuedPdf,
  'report/save': savePdf,
  'verify/run': verify,
}

export async function dispatch(name: string, input: unknown, context: Context): Promise<Envelope> {
  try {
    return { ok: true, value: await answer(name, input, context) }
  } catch (error) {
    const faults = faultsOf(error)
    if (faults) return { ok: false, faults }
    const bug = error instanceof Error ? error : new Error(String(error))
    return { ok: false, bug: { message: bug.message, stack: bug.stack ?? '' } }
  }
}

function answer(name: string, input: unknown, context: Context): unknown {
  if (!Object.hasOwn(requests, name)) throw new Fault('request.unknown', { value: name })
  const request = requests[name as RequestName]
  // To the validator a list is an object whose keys are none of its business.
  if (Array.isArray(input)) throw new Fault('request.malformed', { value: name })
  const parsed = v.safeParse(request.takes as v.GenericSchema, input, { abortEarly: true })
  if (!parsed.success) {
    const path = v.getDotPath(parsed.issues[0])
    throw new Fault('request.malformed', { value: name, ...(path ? { path } : {}) })
  }
  const handler = handlers[name as RequestName] as (input: unknown, context: Context, store?: WriteStore) => unknown
  if (!request.writes) return handler(parsed.output, context)
  return openProject(context).write((store) => handler(parsed.output, context, store))
}
