/**
 * The built window as an allow-list made once at start: what is not in the list is not served, so no path can
 * climb out of the folder. Both window shells serve from it, with the same headers.
 */
import { readFileSync, readdirSync } from 'node:fs'
import { extname, join, relative, sep } from 'node:path'

const TYPES: Record<string, string> = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.mjs': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.svg': 'image/svg+xml; charset=utf-8',
  '.png': 'image/png',
  '.ico': 'image/x-icon',
  '.ttf': 'font/ttf',
  '.woff2': 'font/woff2',
  '.wasm': 'application/wasm',
  '.bcmap': 'application/octet-stream',
  '.pfb': 'application/octet-stream',
}

export interface WindowFile {
  type: string
  read(): Uint8Array<ArrayBuffer>
}

/** By the path of its address: `/` for the page itself, `/assets/…` for the rest. */
export type WindowFiles = ReadonlyMap<string, WindowFile>

export function windowFiles(folder: string): WindowFiles {
  const files = new Map<string, WindowFile>()
  for (const entry of readdirSync(folder, { recursive: true, withFileTypes: true })) {
    const type = TYPES[extname(entry.name).toLowerCase()]
    if (!entry.isFile() || !type) continue
    const path = join(entry.parentPath, entry.name)
    const address = `/${relative(folder, path).split(sep).map(encodeURIComponent).join('/')}`
    const file: WindowFile = { type, read: () => new Uint8Array(readFileSync(path)) }
    files.set(address, file)
    if (address === '/index.html') files.set('/', file)
  }
  return files
}

/**
 * Nothing but what is in the package, no network, no frame around it. Styles set on single elements are let in
 * because the drawing and the pages of the report are placed by them; scripts are files of ours without exception.
 */
export const SAFE_HEADERS: Readonly<Record<string, string>> = {
  'content-security-policy': [
    "default-src 'none'",
    "script-src 'self'",
    "style-src 'self'",
    "style-src-attr 'unsafe-inline'",
    "img-src 'self' data: blob:",
    "font-src 'self' data:",
    "connect-src 'self'",
    "worker-src 'self' blob:",
    "manifest-src 'self'",
    "base-uri 'none'",
    "form-action 'none'",
    "frame-ancestors 'none'",
    "object-src 'none'",
  ].join('; '),
  'x-content-type-options': 'nosniff',
  'x-frame-options': 'DENY',
  'referrer-policy': 'no-referrer',
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
  'permissions-policy': 'camera=(), microphone=(), geolocation=(), usb=(), serial=(), hid=(), clipboard-read=()',
  'cache-control': 'no-store',
}
