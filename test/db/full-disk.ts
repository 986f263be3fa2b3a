/** Fills the disk that it is given the folder of and says what was refused; test/db/durable.test.ts starts it. */
import { readdirSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { projects } from '../../db/projects.ts'
import { faultsOf } from '../../app/model/faults.ts'
import { smallBuilding } from '../support/made.ts'

const WHEN = '2026-05-04T08:30:00Z'
const folder = process.argv[2]!
const path = join(folder, 'store.levelstead')
const building = smallBuilding()
const desk = projects(() => WHEN)
desk.create(path, building, building.survey.rounds, 'w', WHEN)

const filler = join(folder, 'filler')
for (let size = 300_000; size > 0; size -= 4096) {
  try {
    writeFileSync(filler, new Uint8Array(size))
    break
  } catch {
    // Too large for what is left: the next is smaller.
  }
}

function refusal(run: () => void): string | undefined {
  try {
    run()
    return undefined
  } catch (error) {
    return faultsOf(error)?.[0]?.code ?? String(error)
  }
}

const project = desk.open(path)
const note = 'x'.repeat(20_000)
const draft = refusal(() => project.write((store) => store.putDraft({ id: 'R9', date: '', note }, WHEN)))
const making = refusal(() => desk.create(join(folder, 'b.levelstead'), building, [], 'w', WHEN))
const duplicating = refusal(() => desk.duplicate(project, join(folder, 'c.levelstead')))
project.close()
rmSync(filler)
const { read, close } = desk.open(path)
const drafts = read.rounds().filter((round) => round.state === 'draft').length
console.log(
  JSON.stringify({ draft, making, duplicating, left: readdirSync(folder), name: read.building().name, drafts }),
)
close()
