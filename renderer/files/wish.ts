/** What is asked of the person where a file is to be opened or written. */
export interface FileWish {
  does: 'open' | 'save'
  title: string
  /** Extensions without their dot; the first is given to a name typed without one. */
  kinds: readonly string[]
  /** Proposed name, without its extension. */
  name?: string
}

/** The path with the first of the kinds, unless it ends in one of them. */
export function withKind(path: string, kinds: readonly string[]): string {
  const isKnown = kinds.some((kind) => path.toLowerCase().endsWith(`.${kind}`))
  return isKnown || !kinds[0] ? path : `${path}.${kinds[0]}`
}

/** The folder that a path is in; undefined of a bare name. */
export function folderOf(path: string): string | undefined {
  const folder = /^(.*)[\\/][^\\/]*$/.exec(path)?.[1]
  // The top of a disk keeps its separator.
  return folder === '' || folder?.endsWith(':') ? path.slice(0, folder.length + 1) : folder
}
