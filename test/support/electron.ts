/** A stand-in for the `electron` module: notes what is made and lets tests send what the real one would. */
import { EventEmitter } from 'node:events'
import type { ElectronModule } from '../../app/shells/desktop.ts'

type Handler = (...args: never[]) => unknown

export class FakeContents extends EventEmitter {
  readonly mainFrame = { url: 'levelstead://window/index.html' }
  readonly sent: unknown[][] = []
  openHandler: ((details: { url: string }) => { action: string }) | undefined
  reloads = 0

  setWindowOpenHandler(handler: (details: { url: string }) => { action: string }): void {
    this.openHandler = handler
  }
  send(...args: unknown[]): void {
    this.sent.push(args)
  }
  reload(): void {
    this.reloads++
  }
}

export interface FakeElectron {
  electron: ElectronModule
  app: EventEmitter & { quits: number; locked: boolean }
  windows: { options: Record<string, unknown>; contents: FakeContents; loaded: string[]; shown: number }[]
  handlers: Map<string, Handler>
  schemes: Map<string, (request: Request) => Response>
  privileged: unknown[]
  session: Record<string, Handler> & { beforeRequest?: Handler; events: EventEmitter }
  errors: string[]
  answers: { open: { canceled: boolean; filePaths: string[] }; save: { canceled: boolean; filePath: string } }
  dialogs: unknown[]
}

export function fakeElectron({ locked = false } = {}): FakeElectron {
  const windows: FakeElectron['windows'] = []
  const handlers: FakeElectron['handlers'] = new Map()
  const schemes: FakeElectron['schemes'] = new Map()
  const privileged: unknown[] = []
  const errors: string[] = []
  const dialogs: unknown[] = []
  const answers: FakeElectron['answers'] = {
    open: { canceled: false, filePaths: ['/tmp/chosen.levelstead'] },
    save: { canceled: true, filePath: '' },
  }
  const app = Object.assign(new EventEmitter(), {
    quits: 0,
    locked,
    requestSingleInstanceLock: () => !locked,
    whenReady: () => Promise.resolve(),
    quit() {
      app.quits++
    },
  })
  const events = new EventEmitter()
  const session = {
    events,
    setPermissionRequestHandler(handler: Handler) {
      session.permission = handler
    },
    setPermissionCheckHandler(handler: Handler) {
      session.permissionCheck = handler
    },
    setDevicePermissionHandler(handler: Handler) {
      session.device = handler
    },
    webRequest: {
      onBeforeRequest(handler: Handler) {
        session.beforeRequest = handler
      },
    },
    on: (name: string, handler: (...args: unknown[]) => void) => events.on(name, handler),
  } as unknown as FakeElectron['session']

  class FakeWindow extends EventEmitter {
    readonly webContents = new FakeContents()
    readonly record: FakeElectron['windows'][number]

    constructor(options: Record<string, unknown>) {
      super()
      this.record = { options, contents: this.webContents, loaded: [], shown: 0 }
      windows.push(this.record)
      app.emit('web-contents-created', {}, this.webContents)
    }
    loadURL(url: string): Promise<void> {
      this.record.loaded.push(url)
      queueMicrotask(() => this.emit('ready-to-show'))
      return Promise.resolve()
    }
    show(): void {
      this.record.shown++
    }
    focus(): void {}
    isMinimized(): boolean {
      return false
    }
    restore(): void {}
  }

  const electron = {
    app,
    BrowserWindow: FakeWindow,
    Menu: { buildFromTemplate: (template: unknown) => template, setApplicationMenu: () => undefined },
    dialog: {
      showOpenDialog: (...args: unknown[]) => (dialogs.push(args.at(-1)), Promise.resolve(answers.open)),
      showSaveDialog: (...args: unknown[]) => (dialogs.push(args.at(-1)), Promise.resolve(answers.save)),
      showErrorBox: (title: string, text: string) => errors.push(`${title}: ${text}`),
    },
    ipcMain: { handle: (channel: string, handler: Handler) => handlers.set(channel, handler) },
    protocol: {
      registerSchemesAsPrivileged: (list: unknown[]) => privileged.push(...list),
      handle: (scheme: string, handler: (request: Request) => Response) => schemes.set(scheme, handler),
    },
    session: { defaultSession: session },
  } as unknown as ElectronModule

  return { electron, app, windows, handlers, schemes, privileged, session, errors, answers, dialogs }
}
