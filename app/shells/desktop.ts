/**
 * The desktop window. Kept so thin that a stand-in for the `electron` module is enough to test it: it opens one
 * hardened window on our own scheme and passes calls between that window and the core.
 */
import { extname, join, resolve } from 'node:path'
import type * as Electron from 'electron'
import { words } from '../model/faults.ts'
import type { Envelope } from '../contract/wire.ts'
import type { Core } from './core.ts'
import { harden, hardenSession, isOurs, SCHEME, START } from './desktop-hardening.ts'
import { answerCall, type Dialog, type Dialogs, type DialogWish } from './shell-calls.ts'
import { SAFE_HEADERS, type WindowFiles } from './window-files.ts'

export const CHANNEL = 'levelstead:call'
export const PROGRESS = 'levelstead:progress'

/** The window's paper, so that nothing flashes before the page is drawn. */
const PAPER = '#f6f4ee'

export type ElectronModule = Pick<
  typeof Electron,
  'app' | 'BrowserWindow' | 'Menu' | 'dialog' | 'ipcMain' | 'protocol' | 'session'
>

export interface DesktopSettings {
  core: Core
  files: WindowFiles
  preload: string
  /** Arguments of this start without the program's own. */
  args: readonly string[]
}

/** The project file among the arguments that the operating system passes. */
export function projectAmong(args: readonly string[], folder: string): string | undefined {
  const file = args.find((word) => !word.startsWith('-') && extname(word).toLowerCase() === '.levelstead')
  return file === undefined ? undefined : resolve(folder, file)
}

function filtersOf(wish: DialogWish): Electron.FileFilter[] {
  return wish.kinds?.length
    ? [{ name: wish.kinds.map((kind) => `.${kind}`).join(', '), extensions: [...wish.kinds] }]
    : []
}

/** The system's own dialogs; they answer with a path and touch no file. */
function systemDialogs(dialog: Electron.Dialog, window: () => Electron.BrowserWindow | null): Dialogs {
  const open: Dialog = async (wish) => {
    const options = {
      title: wish.title,
      defaultPath: wish.at,
      filters: filtersOf(wish),
      properties: ['openFile' as const],
    }
    const parent = window()
    const { canceled, filePaths } = await (parent
      ? dialog.showOpenDialog(parent, options)
      : dialog.showOpenDialog(options))
    return canceled ? null : (filePaths[0] ?? null)
  }
  const save: Dialog = async (wish) => {
    const options = { title: wish.title, defaultPath: wish.at, filters: filtersOf(wish) }
    const parent = window()
    const { canceled, filePath } = await (parent
      ? dialog.showSaveDialog(parent, options)
      : dialog.showSaveDialog(options))
    return canceled || !filePath ? null : filePath
  }
  return { open, save }
}

function say(dialog: Electron.Dialog, envelope: Envelope): void {
  if (envelope.ok) return
  const text =
    'bug' in envelope
      ? 'Levelstead itself failed. The file is as it was.'
      : envelope.faults.map((fault) => Object.values(words(fault)).join('\n')).join('\n\n')
  dialog.showErrorBox('The file was not opened', text)
}

/** Editing and zoom by the system's own keys; nothing else is in a menu. */
function menuOf(Menu: typeof Electron.Menu): Electron.Menu {
  return Menu.buildFromTemplate([
    ...(process.platform === 'darwin' ? [{ role: 'appMenu' as const }] : []),
    { role: 'editMenu' },
    {
      label: 'View',
      submenu: [{ role: 'resetZoom' }, { role: 'zoomIn' }, { role: 'zoomOut' }, { role: 'togglefullscreen' }],
    },
    { role: 'windowMenu' },
  ])
}

export function startDesktop(electron: ElectronModule, settings: DesktopSettings): void {
  const { app, BrowserWindow, Menu, dialog, ipcMain, protocol } = electron
  const { core, files } = settings
  let window: Electron.BrowserWindow | null = null
  let wanted = projectAmong(settings.args, process.cwd())

  if (!app.requestSingleInstanceLock()) {
    app.quit()
    return
  }
  protocol.registerSchemesAsPrivileged([
    { scheme: SCHEME, privileges: { standard: true, secure: true, supportFetchAPI: true } },
  ])

  async function openWanted(): Promise<void> {
    const path = wanted
    wanted = undefined
    if (path !== undefined) say(dialog, await core.call({ id: 'open', name: 'project/open', input: { path } }))
  }

  /** Another file for the window that stands open. */
  async function openInWindow(path: string | undefined): Promise<void> {
    if (window?.isMinimized()) window.restore()
    window?.focus()
    if (path === undefined) return
    wanted = path
    // Before the first window is made, it takes the file along itself.
    if (!window) return
    await openWanted()
    window.webContents.reload()
  }

  function makeWindow(): void {
    const made = new BrowserWindow({
      width: 1360,
      height: 860,
      minWidth: 1000,
      minHeight: 640,
      title: 'Levelstead',
      backgroundColor: PAPER,
      show: false,
      webPreferences: {
        preload: settings.preload,
        sandbox: true,
        contextIsolation: true,
        nodeIntegration: false,
        nodeIntegrationInWorker: false,
        nodeIntegrationInSubFrames: false,
        webSecurity: true,
        webviewTag: false,
        navigateOnDragDrop: false,
        spellcheck: false,
      },
    })
    window = made
    made.once('ready-to-show', () => made.show())
    made.on('closed', () => (window = null))
    void made.loadURL(START)
  }

  const dialogs = systemDialogs(dialog, () => window)
  ipcMain.handle(CHANNEL, async (event, call: unknown): Promise<Envelope> => {
    const frame = event.senderFrame
    if (!window || !frame || frame !== window.webContents.mainFrame || !isOurs(frame.url))
      return { ok: false, bug: { message: 'The call came from elsewhere than the window.', stack: '' } }
    return answerCall(core, call, dialogs)
  })
  core.onProgress((progress) => window?.webContents.send(PROGRESS, progress))

  app.on('open-file', (event, path) => {
    event.preventDefault()
    void openInWindow(path)
  })
  app.on('second-instance', (_event, args, folder) => void openInWindow(projectAmong(args.slice(1), folder)))
  app.on('window-all-closed', () => void core.close().finally(() => app.quit()))
  harden(app)

  void app.whenReady().then(async () => {
    Menu.setApplicationMenu(menuOf(Menu))
    hardenSession(electron.session.defaultSession)
    protocol.handle(SCHEME, (request) => serveFile(files, request))
    await openWanted()
    makeWindow()
  })
}

/** Built window files alone, by the list made at start. */
function serveFile(files: WindowFiles, request: Request): Response {
  const address = new URL(request.url)
  const file = isOurs(request.url) && request.method === 'GET' ? files.get(address.pathname) : undefined
  return file ? fileResponse(file.read(), file.type) : fileResponse('There is no such page.', 'text/plain', 404)
}

function fileResponse(body: Uint8Array<ArrayBuffer> | string, type: string, status = 200): Response {
  return new Response(body, { status, headers: { ...SAFE_HEADERS, 'content-type': type } })
}

/** Paths of what stands beside the bundled main. */
export function besideMain(folder: string): { preload: string; worker: string; window: string } {
  return {
    preload: join(folder, 'electron-preload.cjs'),
    worker: join(folder, 'core-worker.js'),
    window: join(folder, 'window'),
  }
}
