/** Edits as rows: what the file holds is what the model says, undo and redo are exact, and both outlive a restart. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { Change, Edit } from '../../app/model/changes.ts'
import { placeStuds } from '../../app/model/edits/points.ts'
import { moveSupport, removeSupports } from '../../app/model/edits/supports.ts'
import { Fault } from '../../app/model/faults.ts'
import { applyChanges } from '../../app/model/apply-changes.ts'
import { writeBuilding } from '../../app/model/write-building.ts'
import { connect } from '../../db/connection.ts'
import { anyEdit, START } from '../support/made-edits.ts'
import { anyBuilding, smallBuilding } from '../support/made.ts'
import { codesBy, faultsBy, madeProject, opened, temporary, WHEN, WHO } from '../support/opened.ts'
import { projects } from '../../db/projects.ts'

const RUNS = { numRuns: 20 }

describe('a description that is edited', () => {
  it('is in the file what it is in the model, and undone it is the first again, to the byte', () => {
    fc.assert(
      fc.property(fc.array(anyEdit, { maxLength: 8 }), fc.nat(8), (steps, restartAfter) => {
        const path = madeProject(START)
        let project = projects(() => WHEN).open(path)
        try {
          let model = project.read.building()
          const texts = [writeBuilding(model)]
          steps.forEach((make, i) => {
            if (i === restartAfter) {
              project.close()
              project = projects(() => WHEN).open(path)
            }
            const edit = made(() => make(model))
            if (!edit) return
            model = applyChanges(model, edit.changes)
            project.write((store) => store.edit(edit, WHO, WHEN))
            expect(project.read.building()).toEqual(model)
            texts.push(writeBuilding(model))
          })
          project.close()
          project = projects(() => WHEN).open(path)
          for (const text of texts.toReversed()) {
            expect(writeBuilding(project.read.building())).toBe(text)
            project.write((store) => store.undo(WHO, WHEN))
          }
          expect(project.read.undoName()).toBeNull()
          for (const text of texts.slice(1)) {
            project.write((store) => store.redo(WHO, WHEN))
            expect(writeBuilding(project.read.building())).toBe(text)
          }
          expect(project.read.redoName()).toBeNull()
        } finally {
          project.close()
        }
      }),
      RUNS,
    )
  })

  it('is read back from the file as it was made, whatever building it is', () => {
    fc.assert(
      fc.property(anyBuilding, (building) => {
        const path = temporary()
        projects(() => WHEN).create(path, building, building.survey.rounds, WHO, WHEN)
        const project = projects(() => WHEN).open(path)
        expect(writeBuilding(project.read.building())).toBe(writeBuilding(building))
        project.close()
      }),
      RUNS,
    )
  })
})

/** The edit; undefined where it cannot be made of the building as it is. */
function made(make: () => Edit): Edit | undefined {
  try {
    return make()
  } catch (error) {
    if (error instanceof Fault) return undefined
    throw error
  }
}

describe('undo', () => {
  function moved(x_m: number): Edit {
    return moveSupport(smallBuilding(), 'A2', { x_m })
  }

  it('is named after the edit that it takes back, and so is redo', () => {
    const project = opened(madeProject())
    project.write((store) => store.edit({ ...moved(7), what: 'Move support A2' }, WHO, WHEN))
    expect([project.read.undoName(), project.read.redoName()]).toEqual(['Move support A2', null])
    expect(project.write((store) => store.undo(WHO, WHEN))).toBe('Move support A2')
    expect([project.read.undoName(), project.read.redoName()]).toEqual([null, 'Move support A2'])
    expect(project.write((store) => store.undo(WHO, WHEN))).toBeNull()
  })

  it('drops what could be redone once something else is edited, and keeps it to be read', () => {
    const path = madeProject()
    const project = opened(path)
    project.write((store) => {
      store.edit(moved(7), WHO, WHEN)
      store.undo(WHO, WHEN)
      store.edit({ ...moved(8), what: 'Move elsewhere' }, WHO, WHEN)
    })
    expect([project.read.undoName(), project.read.redoName()]).toEqual(['Move elsewhere', null])
    const db = connect(path, { readonly: true })
    expect(db.prepare('SELECT state FROM edit ORDER BY seq').pluck().all()).toEqual(['dropped', 'done'])
    db.close()
  })

  it('leaves alone what was accepted in between, and refuses to take away a point that was read', () => {
    const { survey: _, ...described } = smallBuilding()
    const bench = { id: 'BM1', kind: 'benchmark', level_m: 10 } as const
    const building = { ...described, survey: { points: [bench], rounds: [] } }
    const project = opened(madeProject(building))
    project.write((store) => {
      store.edit(placeStuds(building), WHO, WHEN)
      const levels = store.building().survey.points.flatMap(({ id, kind }) => (kind === 'stud' ? [id] : []))
      const round = { id: 'R0', date: '2026-05-04' }
      store.putDraft({ ...round, levels: levels.map((point) => ({ point, level_m: 10, sd_mm: 0.3 })) }, WHEN)
      store.accept('R0', WHO, WHEN)
    })
    const before = project.read.building()
    expect(faultsBy(() => project.write((store) => store.undo(WHO, WHEN)))).toMatchObject([
      { code: 'point.read', place: { detail: { rounds: ['R0'] } } },
    ])
    expect(project.read.building()).toEqual(before)
  })

  it('writes every edit, undo and redo into the journal: who, when and what', () => {
    const path = madeProject()
    const project = opened(path)
    project.write((store) => store.edit({ ...moved(7), what: 'Move support A2' }, 'Ann', '2026-05-04T09:00:00Z'))
    project.write((store) => store.undo('Bert', '2026-05-04T10:00:00Z'))
    project.write((store) => store.redo('Cleo', '2026-05-04T11:00:00Z'))
    const db = connect(path, { readonly: true })
    expect(db.prepare('SELECT at, who, what FROM journal ORDER BY seq').all()).toEqual([
      { at: WHEN, who: WHO, what: 'Make the project' },
      { at: '2026-05-04T09:00:00Z', who: 'Ann', what: 'Move support A2' },
      { at: '2026-05-04T10:00:00Z', who: 'Bert', what: 'undo: Move support A2' },
      { at: '2026-05-04T11:00:00Z', who: 'Cleo', what: 'redo: Move support A2' },
    ])
    db.close()
  })
})

describe('an edit that does not fit', () => {
  it('is refused whole: nothing of it is stored, not even its first change', () => {
    const project = opened(madeProject())
    const [a1] = smallBuilding().supports
    const first: Change = { kind: 'support', id: 'A1', before: a1!, after: { ...a1!, x_m: -5 } }
    const gone: Change = { kind: 'support', id: 'A7', before: a1!, after: null }
    const before = [project.read.building(), project.read.revision()]
    const changes = [first, gone]
    expect(codesBy(() => project.write((store) => store.edit({ what: 'x', changes }, WHO, WHEN)))).toEqual([
      'change.unfit',
    ])
    expect([project.read.building(), project.read.revision()]).toEqual(before)
    expect(project.read.undoName()).toBeNull()
  })

  it('is refused where it leaves a reference open, or takes a point that was read', () => {
    const project = opened(madeProject())
    function refused(changes: readonly Change[]): string[] {
      return codesBy(() => project.write((store) => store.edit({ what: 'x', changes }, WHO, WHEN)))
    }
    const { sections, survey } = smallBuilding()
    expect(refused([{ kind: 'section', id: 'beam', before: sections[0]!, after: null }])).toEqual(['change.unfit'])
    expect(refused([{ kind: 'point', id: 'S-A1', before: survey.points[1]!, after: null }])).toEqual(['point.read'])
    expect(codesBy(() => removeSupports(project.read.building(), ['A1']))).not.toEqual([])
    expect(project.read.building()).toEqual(smallBuilding())
  })
})
