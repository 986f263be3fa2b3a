/**
 * The port `Files` over Node's file system. What the world refuses becomes a Fault; what is written stands
 * beside its target first and takes its name only when it is whole.
 */
import {
  closeSync,
  existsSync,
  fsyncSync,
  lstatSync,
  openSync,
  readFileSync,
  readdirSync,
  realpathSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
  writeSync,
} from 'node:fs'
import { homedir } from 'node:os'
import { basename, dirname, join, resolve } from 'node:path'
import { Fault, type FaultCode } from '../model/faults.ts'
import type { FolderView } from '../contract/views.ts'
import type { Files } from '../usecases/ports.ts'

/** Far above any building file, table or project; below what would fill the memory. */
const LARGEST_BYTES = 512 * 1024 * 1024

const READING: Record<string, FaultCode> = {
  ENOENT: 'file.missing',
  ENOTDIR: 'file.missing',
  EISDIR: 'file.folder',
}

const WRITING: Record<string, FaultCode> = {
  ENOENT: 'folder.missing',
  ENOTDIR: 'folder.missing',
  EISDIR: 'file.folder',
  EEXIST: 'file.exists',
  ENOSPC: 'disk.full',
  EDQUOT: 'disk.full',
  EBUSY: 'file.busy',
  ETXTBSY: 'file.busy',
}

/** What the system says of a file, as a Fault; an error that is not the system's is thrown on as it is. */
export function systemFault(error: unknown, file: string, doing: 'reading' | 'writing'): unknown {
  const reason = (error as NodeJS.ErrnoException | undefined)?.code
  if (!(error instanceof Error) || reason === undefined || !/^E[A-Z0-9]+$/.test(reason)) return error
  const known = doing === 'reading' ? READING : WRITING
  const code = known[reason] ?? (doing === 'reading' ? 'file.unreadable' : 'file.unwritable')
  return new Fault(code, { file, detail: { reason } }, { cause: error })
}

function readBytes(path: string): Uint8Array {
  try {
    const stat = statSync(path)
    if (stat.isDirectory()) throw new Fault('file.folder', { file: path })
    // A pipe may stand for a file; a device has no end.
    if (stat.isCharacterDevice() || stat.isBlockDevice() || stat.isSocket())
      throw new Fault('file.unreadable', { file: path, detail: { reason: 'it is a device' } })
    if (stat.size > LARGEST_BYTES) throw new Fault('file.large', { file: path, value: stat.size })
    return new Uint8Array(readFileSync(path))
  } catch (error) {
    throw systemFault(error, path, 'reading')
  }
}

function writeWhole(path: string, bytes: Uint8Array): void {
  // A link keeps pointing where it did: the file behind it is replaced.
  const linked = lstatSync(path, { throwIfNoEntry: false })?.isSymbolicLink() && existsSync(path)
  const target = linked ? realpathSync(path) : resolve(path)
  const before = statSync(target, { throwIfNoEntry: false })
  if (before?.isDirectory()) throw new Fault('file.folder', { file: path })
  if (before && !before.isFile()) {
    writeFileSync(target, bytes)
    return
  }
  const beside = join(dirname(target), `.${basename(target)}.${process.pid}.part`)
  const handle = openSync(beside, 'wx', before ? before.mode & 0o777 : 0o666)
  try {
    try {
      for (let done = 0; done < bytes.length;) done += writeSync(handle, bytes, done)
      fsyncSync(handle)
    } finally {
      closeSync(handle)
    }
    renameSync(beside, target)
  } catch (error) {
    rmSync(beside, { force: true })
    throw error
  }
}

function listFolder(folder: string): FolderView {
  try {
    const path = resolve(folder)
    const folders: string[] = []
    const files: string[] = []
    for (const entry of readdirSync(path, { withFileTypes: true })) {
      if (entry.name.startsWith('.')) continue
      const stat = entry.isSymbolicLink() ? statSync(join(path, entry.name), { throwIfNoEntry: false }) : entry
      if (stat?.isDirectory()) folders.push(entry.name)
      else if (stat?.isFile() && /\.(levelstead|json|csv|tsv|txt|pdf)$/i.test(entry.name)) files.push(entry.name)
    }
    const order = new Intl.Collator('en', { numeric: true }).compare
    const parent = dirname(path)
    return {
      folder: path,
      parent: parent === path ? null : parent,
      folders: folders.sort(order),
      files: files.sort(order),
    }
  } catch (error) {
    throw systemFault(error, folder, 'reading')
  }
}

export function nodeFiles(): Files {
  return {
    home: homedir,
    list: listFolder,
    exists(path) {
      try {
        return lstatSync(path, { throwIfNoEntry: false }) !== undefined
      } catch (error) {
        throw systemFault(error, path, 'reading')
      }
    },
    readBytes,
    writeBytes(path, bytes) {
      try {
        writeWhole(path, typeof bytes === 'string' ? Buffer.from(bytes) : bytes)
      } catch (error) {
        throw systemFault(error, path, 'writing')
      }
    },
  }
}
