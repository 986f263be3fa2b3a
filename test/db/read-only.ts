/** Opens the project in a folder that takes no writing and says what was seen and refused; test/db/durable.test.ts starts it. */
import { readdirSync } from 'node:fs'
import { join } from 'node:path'
import { projects } from '../../db/projects.ts'
import { faultsOf } from '../../app/model/faults.ts'
import { smallBuilding } from '../support/made.ts'

const WHEN = '2026-05-06T08:30:00Z'
const folder = process.argv[2]!
const desk = projects(() => WHEN)
const project = desk.open(join(folder, 'store.levelstead'))

function refusal(run: () => void): string | undefined {
  try {
    run()
    return undefined
  } catch (error) {
    return faultsOf(error)?.[0]?.code ?? String(error)
  }
}

const edit = refusal(() => project.write((store) => store.putDraft({ id: 'R9', date: '' }, WHEN)))
const making = refusal(() => desk.create(join(folder, 'b.levelstead'), smallBuilding(), [], 'w', WHEN))
const { readOnly } = project.read
console.log(JSON.stringify({ readOnly, name: project.read.building().name, edit, making, left: readdirSync(folder) }))
project.close()
