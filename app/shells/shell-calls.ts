/**
 * A call as it comes from a window, whichever the shell: its form is checked, the few names that the shell itself
 * answers are answered here, everything else goes to the core. The file dialogs of the system are the one
 * difference between the shells.
 */
import type { Call, Envelope } from '../contract/wire.ts'
import type { Core } from './core.ts'

export interface DialogWish {
  title?: string
  /** Folder or file that the dialog starts at. */
  at?: string
  /** Extensions without their dot. */
  kinds?: readonly string[]
}

/** Gives the path that the person chose, or null. */
export type Dialog = (wish: DialogWish) => Promise<string | null>

export interface Dialogs {
  open?: Dialog
  save?: Dialog
}

function isText(value: unknown): value is string {
  return typeof value === 'string' && value.length <= 4096
}

function isCall(value: unknown): value is Call {
  if (typeof value !== 'object' || value === null) return false
  const { id, name } = value as Partial<Call>
  return isText(id) && isText(name)
}

function wishOf(input: unknown): DialogWish {
  const { title, at, kinds } = (input ?? {}) as Record<string, unknown>
  const wish: DialogWish = {}
  if (isText(title)) wish.title = title
  if (isText(at)) wish.at = at
  if (Array.isArray(kinds)) wish.kinds = kinds.filter((kind) => isText(kind) && /^[a-z0-9.]+$/i.test(kind))
  return wish
}

function malformed(path?: string): Envelope {
  return { ok: false, faults: [{ code: 'request.malformed', place: path ? { path } : {} }] }
}

export async function answerCall(core: Core, call: unknown, dialogs: Dialogs): Promise<Envelope> {
  if (!isCall(call)) return malformed()
  const name: string = call.name
  if (name === 'work/stop') {
    const { id } = (call.input ?? {}) as Record<string, unknown>
    if (!isText(id)) return malformed('id')
    core.stop(id)
    return { ok: true, value: null }
  }
  const dialog = name === 'dialog/open' ? dialogs.open : name === 'dialog/save' ? dialogs.save : undefined
  if (dialog) return { ok: true, value: await dialog(wishOf(call.input)) }
  return core.call({ id: call.id, name: call.name, input: call.input })
}
