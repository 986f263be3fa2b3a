/**
 * Files that are handed out stand under names of their own: nothing is written over, but a building file by a later one
 * where that is asked for. It holds nothing that its project has not; a project, a report or anything else does.
 */
import { Fault } from '../model/faults.ts'
import type { Context } from './ports.ts'

/** Writes a file that is not there yet. Throws `file.exists` where it is. */
export function writeNew({ files }: Context, path: string, bytes: Uint8Array | string): void {
  if (files.exists(path)) throw new Fault('file.exists', { file: path })
  files.writeBytes(path, bytes)
}

/** As our own writer begins one; a file that begins otherwise may be somebody's work. */
const BUILDING_FILE = /^\s*\{\s*"format"\s*:\s*"levelstead-building"/
const BEGINNING = 200

/** Writes a file that is not there yet, or is an earlier building file. Throws `file.exists` where it is another. */
export function writeBuildingFile(context: Context, path: string, text: string): void {
  const { files } = context
  if (!files.exists(path) || !mayBeReplaced(files.readBytes(path))) writeNew(context, path, text)
  else files.writeBytes(path, text)
}

/** An empty file, as a script makes one to hold a name, has nothing to lose either. */
function mayBeReplaced(bytes: Uint8Array): boolean {
  return bytes.length === 0 || isBuildingFile(bytes)
}

function isBuildingFile(bytes: Uint8Array): boolean {
  return BUILDING_FILE.test(String.fromCharCode(...bytes.subarray(0, BEGINNING)))
}
