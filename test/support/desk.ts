/** Everything that a request goes through but its shell, with a clock of the test's own and a folder to work in. For tests. */
import { createHash } from 'node:crypto'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { onTestFinished } from 'vitest'
import type { Answer, Input, RequestName } from '../../app/contract/requests.ts'
import type { Envelope } from '../../app/contract/wire.ts'
import type { Edit } from '../../app/model/changes.ts'
import type { Building } from '../../app/model/building.ts'
import { InputFault, type FaultRecord } from '../../app/model/faults.ts'
import { nodeFiles } from '../../app/shells/node-files.ts'
import { dispatch } from '../../app/usecases/handlers.ts'
import type { Context, Printer } from '../../app/usecases/ports.ts'
import { projects } from '../../db/projects.ts'

/** Prints what it was asked for as one page: for what is done with a report, not for what is in it. */
const noting: Printer = {
  print(building, { label, status, round, date }) {
    const text = JSON.stringify({ building: building.name, label, status, round, date })
    return Promise.resolve({ pdf: new TextEncoder().encode(text), pages: 1 })
  },
}

export interface Desk {
  context: Context
  /** A path in the desk's folder. */
  at(name: string): string
  /** The value of the answer; throws its faults as an InputFault, and a bug as an error. */
  ask<K extends RequestName>(name: K, input: Input<K>): Promise<Answer<K>>
  /** The whole answer to whatever is asked. */
  envelope(name: string, input: unknown): Promise<Envelope>
  /** The faults that the request is refused with. */
  refused(name: RequestName, input: unknown): Promise<readonly FaultRecord[]>
  /** Edits the description of the project that is open. */
  edit(make: (building: Building) => Edit): Promise<Building>
}

/** A desk in a new folder, cleared away when the test ends. Its clock tells the days as they are asked for. */
export function desk(parts: Partial<Context> = {}): Desk {
  const folder = mkdtempSync(join(tmpdir(), 'levelstead-desk-'))
  let seconds = 0
  const context: Context = {
    projects: projects(() => context.clock.now()),
    files: nodeFiles(),
    clock: {
      now: () => new Date(Date.UTC(2026, 4, 4, 8, 0, seconds++)).toISOString().replace('.000', ''),
      who: () => 'T. Tester',
    },
    printer: noting,
    hasher: { sha256: (bytes) => createHash('sha256').update(bytes).digest('hex') },
    session: { project: null },
    signal: { aborted: false },
    progress: () => undefined,
    about: { version: '0', build: '', shell: 'command line' },
    ...parts,
  }
  onTestFinished(() => {
    context.session.project?.close()
    rmSync(folder, { recursive: true, force: true })
  })

  async function ask<K extends RequestName>(name: K, input: Input<K>): Promise<Answer<K>> {
    const envelope = await dispatch(name, input, context)
    if (envelope.ok) return envelope.value as Answer<K>
    if ('faults' in envelope) throw new InputFault(envelope.faults)
    throw new Error(`${name}: ${envelope.bug.stack}`)
  }

  return {
    context,
    at: (name) => join(folder, name),
    ask,
    envelope: (name, input) => dispatch(name, input, context),
    async refused(name, input) {
      const envelope = await dispatch(name, input, context)
      if (!envelope.ok && 'faults' in envelope) return envelope.faults
      throw new Error(`${name} was not refused: ${JSON.stringify(envelope).slice(0, 500)}`)
    },
    async edit(make) {
      const { building } = await ask('describe/edit', make(context.session.project!.read.building()))
      return building
    },
  }
}
