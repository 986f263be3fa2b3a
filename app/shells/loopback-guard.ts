/**
 * What the loopback door turns away before anything is done. Any page in the same browser can send requests to
 * 127.0.0.1, and a name that its owner points there reads the answers as well (DNS rebinding); so the Host must be
 * one of two literals, the Origin ours or absent, and every request that does something must carry the token that
 * only the window's first address has.
 */
import { timingSafeEqual } from 'node:crypto'
import type { IncomingHttpHeaders } from 'node:http'

/** Enough for the changes of a very large building; a readings table is far below. */
export const LARGEST_BODY_BYTES = 32 * 1024 * 1024
export const TOKEN_HEADER = 'x-levelstead-token'

export interface Knock {
  method: string
  /** As it came, undecoded. */
  path: string
  headers: IncomingHttpHeaders
}

export interface House {
  port: number
  token: string
}

export interface Refusal {
  status: 403 | 404 | 405 | 413 | 415
  why: string
  allow?: string
}

/** What is asked for, judged by method and path alone. */
export type Purpose = 'page' | 'call' | 'progress'

export function purposeOf(path: string): Purpose {
  if (path.startsWith('/call/')) return 'call'
  return path === '/progress' ? 'progress' : 'page'
}

function sameToken(given: string | string[] | undefined, token: string): boolean {
  if (typeof given !== 'string') return false
  const a = Buffer.from(given)
  const b = Buffer.from(token)
  return a.length === b.length && timingSafeEqual(a, b)
}

/** Why the request is turned away; undefined where it may come in. */
export function refusal(knock: Knock, house: House): Refusal | undefined {
  const { headers, method } = knock
  const hosts = [`127.0.0.1:${house.port}`, `localhost:${house.port}`]
  if (!hosts.includes(headers.host ?? '')) return { status: 403, why: 'This address is not ours.' }
  const origins = hosts.map((host) => `http://${host}`)
  if (headers.origin !== undefined && !origins.includes(headers.origin))
    return { status: 403, why: 'The request comes from a page that is not ours.' }

  const purpose = purposeOf(knock.path)
  if (purpose === 'page')
    return method === 'GET' || method === 'HEAD' ? undefined : { status: 405, why: 'Only to be read.', allow: 'GET' }

  const allow = purpose === 'call' ? 'POST' : 'GET'
  if (method !== allow) return { status: 405, why: `Only by ${allow}.`, allow }
  const site = headers['sec-fetch-site']
  if (site !== undefined && site !== 'same-origin')
    return { status: 403, why: 'The request comes from a page that is not ours.' }
  if (!sameToken(headers[TOKEN_HEADER], house.token))
    return { status: 403, why: 'The token of this start is missing or wrong.' }
  if (purpose === 'progress') return undefined
  if (!/^application\/json\s*(;\s*charset=utf-8\s*)?$/i.test(headers['content-type'] ?? ''))
    return { status: 415, why: 'Only JSON is taken.' }
  if (Number(headers['content-length'] ?? 0) > LARGEST_BODY_BYTES)
    return { status: 413, why: 'The request is too large.' }
  return undefined
}
