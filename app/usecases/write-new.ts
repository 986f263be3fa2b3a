/** Files that are handed out stand under names of their own: nothing is written over. */
import { Fault } from '../model/faults.ts'
import type { Context } from './ports.ts'

/** Writes a file that is not there yet. Throws `file.exists` where it is. */
export function writeNew({ files }: Context, path: string, bytes: Uint8Array | string): void {
  if (files.exists(path)) throw new Fault('file.exists', { file: path })
  files.writeBytes(path, bytes)
}
