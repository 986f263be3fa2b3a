import { createRequire } from 'node:module'
import { describe, expect, it } from 'vitest'
import { assessBuilding } from '../../app/assess/assess.ts'
import { elevation } from '../../app/drawing/elevation.ts'
import { elementOf } from '../../app/drawing/element.ts'
import { plan } from '../../app/drawing/plan.ts'
import type { Scene } from '../../app/drawing/scene.ts'
import { svg } from '../../app/drawing/svg.ts'
import { darkTheme, lightTheme, printTheme, DARK, LIGHT, PRINT, type Inks } from '../../app/drawing/theme.ts'
import { typeface } from '../../app/report/print.ts'
import { EVIL, hall, textsOf } from '../support/drawn.ts'
import { pdfPages } from '../support/pdf-text.ts'

const load = createRequire(import.meta.url)
const building = hall()
const line = building.frame_lines[0]!.id
const findings = assessBuilding(building, 'R1').rounds[0]!
const scenes: Scene[] = [
  elevation({ building, line, findings, width: 170, height: 102 }),
  elevation({ building, line, width: 170, height: 102, show: { loads: true } }),
  plan({ building, findings, width: 170, height: 122 }),
]

interface XmlNode {
  name?: string
  attr?: Record<string, string>
  children?: XmlNode[]
  text?: string
}

describe('a scene as SVG', () => {
  it('is well-formed XML that gives every name back, whatever it is made of', () => {
    const { XmlDocument } = load('xmldoc') as { XmlDocument: new (text: string) => XmlNode }
    for (const scene of scenes) {
      const root = new XmlDocument(svg(scene, lightTheme))
      expect(root.name).toBe('svg')
      expect(root.attr?.viewBox).toBe(`0 0 ${scene.width} ${scene.height}`)
      expect(JSON.stringify(root)).not.toContain('undefined')
    }
    const named: Scene = {
      width: 9,
      height: 9,
      title: EVIL,
      primitives: [{ shape: 'text', role: 'text', at: [1, 1], text: `a${EVIL}\ud800`, anchor: 'start', size: 3 }],
    }
    const { children } = new XmlDocument(svg(named, printTheme))
    const texts = (children ?? []).flatMap((c) => (c.name === undefined ? [] : [(c as unknown as { val: string }).val]))
    expect(texts).toEqual(['<&"\'>\ufffd ]]>', 'a<&"\'>\ufffd ]]>\ufffd'])
  })

  it('uses only what pdfmake draws: no styles, variables, glyph marks or other typefaces', () => {
    for (const scene of scenes) {
      const drawn = svg(scene, printTheme)
      expect(drawn).not.toMatch(/style=|class=|<style|var\(|currentColor|<use|dominant-baseline/)
      expect(drawn).not.toMatch(/[▲■●○→↓]/)
      expect(new Set(drawn.match(/font-family="[^"]*"/g))).toEqual(new Set(['font-family="Roboto"']))
    }
  })

  it('prints every text, the minus sign included', async () => {
    const pdfmake = (await import('pdfmake')).default
    const fonts = typeface()
    const known = new Set(Object.values(fonts))
    pdfmake.setFonts({ Roboto: fonts })
    pdfmake.setLocalAccessPolicy((path: string) => known.has(path))
    pdfmake.setUrlAccessPolicy(() => false)
    const content = scenes.map((scene) => ({ svg: svg(scene, printTheme), width: 480, pageBreak: 'after' as const }))
    const pages = await pdfPages(new Uint8Array(await pdfmake.createPdf({ content }).getBuffer()))
    scenes.forEach((scene, i) => {
      const page = pages[i]!.replace(/\s+/g, '')
      const texts = textsOf(scene)
        .map((t) => t.text)
        .filter((t) => !t.includes('\u0000'))
      expect(texts.some((t) => t.includes('\u2212'))).toBe(true)
      for (const words of texts) expect(page).toContain(words.replace(/\s+/g, ''))
    })
  })

  it('draws each status in a shape of its own', () => {
    const shapes = (['green', 'amber', 'red', 'none'] as const).map((status) => {
      const { tag, attributes } = elementOf(
        { shape: 'mark', role: `status-${status}`, status, centre: [5, 5], size: 2 },
        lightTheme,
      )
      return `${tag} ${String(attributes.points ?? '').split(' ').length} ${attributes.fill === 'none' ? 'open' : 'filled'}`
    })
    expect(shapes).toEqual(['circle 1 filled', 'polygon 3 filled', 'polygon 4 filled', 'circle 1 open'])
  })
})

/** Relative luminance and contrast of WCAG 2.2. */
function contrast(a: string, b: string): number {
  const [x, y] = [luminance(a), luminance(b)].sort((p, q) => q - p) as [number, number]
  return (x + 0.05) / (y + 0.05)
}

function luminance(colour: string): number {
  const parts = [1, 3, 5].map((i) => Number.parseInt(colour.slice(i, i + 2), 16) / 255)
  const [r, g, b] = parts.map((c) => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4)) as [
    number,
    number,
    number,
  ]
  return 0.2126 * r + 0.7152 * g + 0.0722 * b
}

describe('the themes', () => {
  const inks: [string, Inks][] = [
    ['light', LIGHT],
    ['dark', DARK],
    ['print', PRINT],
  ]

  it.each(inks)('%s: texts have the contrast of WCAG AA (4.5) on paper and where they may lie, shapes 3', (_, c) => {
    for (const text of [c.ink, c.quiet, c.movement, c.bending])
      expect(contrast(text, c.paper)).toBeGreaterThanOrEqual(4.5)
    for (const under of [c.selection, c.bandTint, c.bendingTint])
      expect(contrast(c.ink, under)).toBeGreaterThanOrEqual(4.5)
    for (const shape of [c.green, c.amber, c.red, c.rule]) expect(contrast(shape, c.paper)).toBeGreaterThanOrEqual(3)
  })

  it('have a look for every role, with the paper and ink of the house', () => {
    expect([LIGHT.paper, LIGHT.ink]).toEqual(['#f6f4ee', '#1e2730'])
    const roles = Object.keys(lightTheme.styles)
    for (const theme of [darkTheme, printTheme]) expect(Object.keys(theme.styles)).toEqual(roles)
  })
})
