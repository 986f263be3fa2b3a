/**
 * What the desktop shell refuses: permissions, navigation, further windows, embedded pages, and every request that
 * would leave the machine. Levelstead shows its own files and nothing else.
 */
import type * as Electron from 'electron'

export const SCHEME = 'levelstead'
export const ORIGIN = `${SCHEME}://window`
export const START = `${ORIGIN}/index.html`

/** Whether the address is a page of the window; the check is on the parsed address, never on how its text begins. */
export function isOurs(address: string): boolean {
  if (!URL.canParse(address)) return false
  const { protocol, host } = new URL(address)
  return protocol === `${SCHEME}:` && host === 'window'
}

/** Addresses that stay on the machine: our own, what our page makes in memory, and the tools for developers. */
function staysHere(address: string): boolean {
  if (isOurs(address)) return true
  return URL.canParse(address) && ['blob:', 'data:', 'devtools:'].includes(new URL(address).protocol)
}

/** For every page of the program, also one that should never have come to be. */
export function harden(app: Electron.App): void {
  app.on('web-contents-created', (_event, contents) => {
    contents.on('will-navigate', (event) => event.preventDefault())
    contents.on('will-frame-navigate', (event) => event.preventDefault())
    contents.on('will-redirect', (event) => event.preventDefault())
    contents.on('will-attach-webview', (event) => event.preventDefault())
    contents.setWindowOpenHandler(() => ({ action: 'deny' }))
  })
}

export function hardenSession(session: Electron.Session): void {
  session.setPermissionRequestHandler((_contents, _permission, decide) => decide(false))
  session.setPermissionCheckHandler(() => false)
  session.setDevicePermissionHandler(() => false)
  session.webRequest.onBeforeRequest((details, decide) => decide({ cancel: !staysHere(details.url) }))
  session.on('will-download', (event) => event.preventDefault())
}
