import { describe, expect, it } from 'vitest'
import { fileName, openFile, startBuilding } from '../../renderer/files/openings.ts'
import { folderOf, withKind, type FileWish } from '../../renderer/files/wish.ts'

/** A project that notes what is asked of it, and a person who answers in turn. */
function desk(...answers: (string | null)[]) {
  const asked: string[] = []
  const wishes: FileWish[] = []
  function note(what: string) {
    return (...paths: string[]) => Promise.resolve(void asked.push([what, ...paths].join(' ')))
  }
  const project = { open: note('open'), import: note('import'), start: note('start'), example: note('example') }
  const chooser = {
    ask(wish: FileWish) {
      wishes.push(wish)
      return Promise.resolve(answers.shift() ?? null)
    },
  }
  return { project, chooser, asked, wishes }
}

describe('opening and starting', () => {
  it('opens a project as it is', async () => {
    const { project, chooser, asked } = desk('/a/b.levelstead')
    await openFile(project, chooser)
    expect(asked).toEqual(['open /a/b.levelstead'])
  })

  it('asks of a building file where its project is kept, under the same name', async () => {
    const { project, chooser, asked, wishes } = desk('C:\\rows\\Block 2.building.json', 'C:\\rows\\Block 2.levelstead')
    await openFile(project, chooser)
    expect(wishes[1]).toMatchObject({ does: 'save', kinds: ['levelstead'], name: 'Block 2' })
    expect(asked).toEqual(['import C:\\rows\\Block 2.building.json C:\\rows\\Block 2.levelstead'])
  })

  it('does nothing for a person who turns back', async () => {
    for (const answers of [[null], ['/a/b.json', null]]) {
      const { project, chooser, asked } = desk(...answers)
      await openFile(project, chooser)
      expect(asked).toEqual([])
    }
  })

  it('names a building by its file where no other name is given', async () => {
    const { project, chooser, asked } = desk('/a/Mill Lane.levelstead')
    await startBuilding(project, chooser)
    expect(asked).toEqual(['start /a/Mill Lane.levelstead Mill Lane'])
  })
})

describe('names of files', () => {
  it('have no sign that some system refuses', () => {
    expect(fileName(' 2/3 Mill: "north" ')).toBe('2 3 Mill north')
  })

  it('get the extension that was left out, once', () => {
    expect(['a', 'a.PDF', 'a.b'].map((path) => withKind(path, ['pdf']))).toEqual(['a.pdf', 'a.PDF', 'a.b.pdf'])
  })

  it('stand in their folder, on any system', () => {
    const paths = ['/a/b/c.pdf', 'C:\\rows\\d.pdf', '/e.pdf', 'C:\\f.pdf', 'g.pdf']
    expect(paths.map(folderOf)).toEqual(['/a/b', 'C:\\rows', '/', 'C:\\', undefined])
  })
})
