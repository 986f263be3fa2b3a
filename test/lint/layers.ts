/**
 * Holds the direction of imports. For each layer: the layers it may import, the packages it may import, and
 * whether Node's own modules are open to it. A file in no layer and a package nobody sorted are faults.
 * If a rule is wrong, change the table in a commit of its own; there is no list of exceptions.
 */
import { execFileSync } from 'node:child_process'
import { existsSync, readFileSync } from 'node:fs'
import { dirname, join, normalize } from 'node:path'
import { pathToFileURL } from 'node:url'
import ts from 'typescript'

interface Layer {
  layers: readonly string[]
  packages: readonly string[]
  node?: boolean
}

export const LAYERS: Record<string, Layer> = {
  solver: { layers: [], packages: ['ml-matrix'] },
  'app/model': { layers: [], packages: [] },
  'app/assess': { layers: ['solver', 'app/model'], packages: [] },
  'app/drawing': { layers: ['app/model', 'app/assess'], packages: [] },
  'app/contract': { layers: ['app/model'], packages: ['valibot'] },
  'app/usecases': { layers: ['app/model', 'app/assess', 'app/contract'], packages: ['valibot'] },
  'app/report': {
    layers: ['solver', 'app/model', 'app/assess', 'app/drawing', 'app/contract', 'app/usecases'],
    packages: ['pdfmake'],
    node: true,
  },
  db: { layers: ['app/model', 'app/contract', 'app/usecases'], packages: ['better-sqlite3'], node: true },
  'app/shells': {
    layers: ['app/model', 'app/assess', 'app/drawing', 'app/contract', 'app/usecases', 'app/report', 'db'],
    packages: ['electron', 'esbuild', 'vite', 'electron-builder'],
    node: true,
  },
  renderer: {
    layers: ['app/contract', 'app/model', 'app/assess', 'app/drawing', 'solver'],
    packages: ['svelte', 'pdfjs-dist', 'vite', '@sveltejs/vite-plugin-svelte', 'pdfmake/fonts'],
  },
}

/** Layers that others enter only through one named file. */
const FACES: Record<string, string> = { solver: 'solver/index.ts' }

/** The contract's validator stays out of the window's bundle: the window takes its types only. */
const TYPES_ONLY = [{ from: 'renderer', into: 'app/contract' }]

export function layerOf(file: string): string | undefined {
  return Object.keys(LAYERS)
    .filter((layer) => file.startsWith(`${layer}/`))
    .sort((a, b) => b.length - a.length)[0]
}

interface Import {
  specifier: string
  typeOnly: boolean
}

/** Every import, re-export and dynamic import of a source text; of a component, of its scripts. */
export function importsOf(file: string, text: string): Import[] {
  const source = file.endsWith('.svelte')
    ? [...text.matchAll(/<script[^>]*>([\s\S]*?)<\/script>/g)].map((m) => m[1]).join('\n')
    : text
  const tree = ts.createSourceFile('x.ts', source, ts.ScriptTarget.Latest)
  const found: Import[] = []
  function visit(node: ts.Node): void {
    if ((ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) && node.moduleSpecifier) {
      const typeOnly = ts.isImportDeclaration(node)
        ? node.importClause?.phaseModifier === ts.SyntaxKind.TypeKeyword
        : node.isTypeOnly
      found.push({ specifier: (node.moduleSpecifier as ts.StringLiteral).text, typeOnly })
    }
    const loads =
      ts.isCallExpression(node) &&
      (node.expression.kind === ts.SyntaxKind.ImportKeyword ||
        (ts.isIdentifier(node.expression) && node.expression.text === 'require'))
    if (loads) {
      const argument = node.arguments[0]
      if (argument && ts.isStringLiteralLike(argument)) found.push({ specifier: argument.text, typeOnly: false })
    }
    ts.forEachChild(node, visit)
  }
  visit(tree)
  return found
}

/** What is wrong with one file's imports, a sentence each. */
export function faultsOfFile(file: string, text: string): string[] {
  const own = layerOf(file)
  if (!own) return [`${file}: stands in no layer of test/lint/layers.ts`]
  const rule = LAYERS[own]!
  const faults: string[] = []
  for (const { specifier, typeOnly } of importsOf(file, text)) {
    if (specifier.startsWith('.')) {
      const target = normalize(join(dirname(file), specifier))
      const other = layerOf(target)
      if (other === own) continue
      if (!other || !rule.layers.includes(other)) faults.push(`${file}: ${own} may not import ${target}`)
      else if (FACES[other] && target !== FACES[other]) faults.push(`${file}: enter ${other} through ${FACES[other]}`)
      else if (!typeOnly && TYPES_ONLY.some((t) => t.from === own && t.into === other))
        faults.push(`${file}: take types only from ${other} (import type)`)
    } else if (specifier.startsWith('node:')) {
      if (!rule.node) faults.push(`${file}: ${own} may not import ${specifier}`)
    } else if (!rule.packages.some((p) => specifier === p || specifier.startsWith(`${p}/`)))
      faults.push(`${file}: ${own} may not import the package ${specifier}`)
  }
  return faults
}

function sourceFiles(): string[] {
  return execFileSync('git', ['ls-files', '-co', '--exclude-standard', 'app', 'solver', 'db', 'renderer'], {
    encoding: 'utf8',
  })
    .split('\n')
    .filter((f) => /\.(ts|svelte)$/.test(f) && !/\.config\.ts$|env\.d\.ts$/.test(f) && existsSync(f))
}

/** All faults of the tree. */
export function layerFaults(): string[] {
  return sourceFiles().flatMap((file) => faultsOfFile(file, readFileSync(file, 'utf8')))
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  const faults = layerFaults()
  for (const fault of faults) console.error(fault)
  process.exitCode = faults.length ? 1 : 0
}
