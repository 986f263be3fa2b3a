/** A scene in a theme as SVG text, in the subset that pdfmake draws. */
import { elementOf } from './element.ts'
import type { Primitive, Scene } from './scene.ts'
import type { Theme } from './theme.ts'

export function svg(scene: Scene, theme: Theme): string {
  const { width, height, title, primitives } = scene
  const size = `viewBox="0 0 ${width} ${height}" width="${width}mm" height="${height}mm"`
  const drawn = primitives.map((p) => written(p, theme)).join('\n')
  return `<svg xmlns="http://www.w3.org/2000/svg" ${size}>\n<title>${escaped(title)}</title>\n${drawn}\n</svg>\n`
}

function written(primitive: Primitive, theme: Theme): string {
  const { tag, attributes, text, children } = elementOf(primitive, theme)
  const list = Object.entries(attributes)
    .map(([name, value]) => ` ${name}="${escaped(String(value))}"`)
    .join('')
  if (children) return `<g>${children.map((c) => written(c, theme)).join('')}</g>`
  return text === undefined ? `<${tag}${list}/>` : `<${tag}${list}>${escaped(text)}</${tag}>`
}

/** Characters that XML forbids or gives a meaning are replaced; a name can hold anything. */
function escaped(text: string): string {
  return text
    .replace(
      /[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g,
      '\ufffd',
    )
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;')
}
