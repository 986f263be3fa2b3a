/**
 * The worker thread of both window shells: dispatch, the database and the solver are synchronous, and must not
 * hold up the window. Calls are answered one after the other in the order in which they came, so that closing a
 * project never overtakes a report that is being written into it. Stopping comes through shared memory, since a
 * message would wait behind the very work it is to stop.
 */
import { parentPort, workerData } from 'node:worker_threads'
import type { Stop } from '../contract/wire.ts'
import type { Context, Session } from '../usecases/ports.ts'
import { dispatch } from '../usecases/handlers.ts'
import { loadProjects, nodeContext } from './context.ts'
import type { FromWorker, ToWorker, WorkerSettings } from './core-messages.ts'

const port = parentPort
if (!port) throw new Error('core-worker.ts runs as a worker thread only')

const { shell } = workerData as WorkerSettings
const session: Session = { project: null }
const projects = await loadProjects()

function send(message: FromWorker): void {
  port!.postMessage(message)
}

/** A word in shared memory read as a stop signal. */
function stopOf(shared: SharedArrayBuffer): Stop {
  const word = new Int32Array(shared)
  return {
    get aborted() {
      return Atomics.load(word, 0) !== 0
    },
  }
}

async function answer(message: Extract<ToWorker, { call: unknown }>): Promise<void> {
  const { seq, call } = message
  const signal = stopOf(message.stop)
  const progress: Context['progress'] = (done, of, what) => send({ progress: { id: call.id, done, of, what } })
  if (signal.aborted) {
    send({ seq, envelope: { ok: false, faults: [{ code: 'work.stopped', place: {} }] } })
    return
  }
  const context = nodeContext({ shell, projects, session, signal, progress })
  send({ seq, envelope: await dispatch(call.name, call.input, context) })
}

let line: Promise<void> = Promise.resolve()

port.on('message', (message: ToWorker) => {
  line = line.then(() => {
    if (!('close' in message)) return answer(message)
    session.project?.close()
    session.project = null
    port.close()
    return undefined
  })
})
