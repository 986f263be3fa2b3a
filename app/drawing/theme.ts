/**
 * What each role of a scene looks like, as resolved values: no variables, one typeface. One blue-green for the
 * ground's movement, one violet for bending, status colours for status alone; the rest is ink on paper.
 */
import type { Role } from './scene.ts'

export interface Style {
  stroke?: string
  /** mm */
  width?: number
  /** Of closed shapes only. */
  fill?: string
  /** mm on, mm off */
  dash?: readonly number[]
  cap?: 'butt' | 'round'
  /** Colour of texts with this role. */
  ink?: string
  strong?: boolean
}

export interface Theme {
  name: 'light' | 'dark' | 'print'
  paper: string
  font: string
  styles: Readonly<Record<Role, Style>>
}

export interface Inks {
  paper: string
  ink: string
  quiet: string
  rule: string
  /** Lines that only guide the eye. */
  faint: string
  movement: string
  movementTint: string
  bending: string
  bendingTint: string
  bendingHatch: string
  green: string
  amber: string
  red: string
  selection: string
  bandTint: string
}

export const LIGHT: Inks = {
  paper: '#f6f4ee',
  ink: '#1e2730',
  quiet: '#59626b',
  rule: '#868885',
  faint: '#cfccc2',
  movement: '#0c7378',
  movementTint: '#cbe0dd',
  bending: '#65429a',
  bendingTint: '#e4dde8',
  bendingHatch: '#b9a8cb',
  green: '#2c7a4c',
  amber: '#a86400',
  red: '#b4241c',
  selection: '#ecdcae',
  bandTint: '#e3e3dc',
}

export const PRINT: Inks = {
  ...LIGHT,
  paper: '#ffffff',
  movementTint: '#d3e8e6',
  bendingTint: '#ebe4f1',
  selection: '#f3e6bf',
  bandTint: '#ecece8',
}

export const DARK: Inks = {
  paper: '#171c21',
  ink: '#e9e5db',
  quiet: '#a3abb2',
  rule: '#7b838a',
  faint: '#3d454c',
  movement: '#4cc3c4',
  movementTint: '#1d4347',
  bending: '#b99ae8',
  bendingTint: '#352c47',
  bendingHatch: '#67568a',
  green: '#62c28a',
  amber: '#e3a33c',
  red: '#f2766b',
  selection: '#574a22',
  bandTint: '#2a3138',
}

export const lightTheme: Theme = themeOf('light', LIGHT)
export const darkTheme: Theme = themeOf('dark', DARK)
export const printTheme: Theme = themeOf('print', PRINT)

function themeOf(name: Theme['name'], c: Inks): Theme {
  const thin = { stroke: c.ink, width: 0.18 }
  const quietLine = { stroke: c.rule, width: 0.18 }
  function filled(colour: string): Style {
    return { fill: colour, stroke: colour, width: 0.2, ink: colour }
  }
  return {
    name,
    paper: c.paper,
    font: 'Roboto',
    styles: {
      member: { stroke: c.ink, width: 0.45, cap: 'round' },
      'member-green': { stroke: c.ink, width: 0.45, cap: 'round' },
      'member-amber': { stroke: c.amber, width: 0.75, cap: 'round' },
      'member-red': { stroke: c.red, width: 0.95, cap: 'round' },
      ground: quietLine,
      footing: { ...thin, width: 0.25, fill: c.paper },
      grid: { stroke: c.ink, width: 0.22, fill: c.paper },
      dimension: { ...thin, fill: 'none', ink: c.ink },
      level: { ...thin, fill: c.paper },
      settlement: { stroke: c.movement, width: 0.35, fill: c.movement },
      'settlement-disc': { stroke: c.movement, width: 0.25, fill: c.movementTint },
      'settlement-rise': { stroke: c.movement, width: 0.3, fill: c.paper },
      'settlement-estimated': { stroke: c.movement, width: 0.25, dash: [0.9, 0.6], fill: c.paper },
      deformed: { stroke: c.movement, width: 0.35, dash: [1.5, 0.9] },
      contour: { stroke: c.movement, width: 0.22, ink: c.movement },
      tilt: { stroke: c.movement, width: 0.45, fill: c.movement, ink: c.ink },
      moment: { stroke: c.bending, width: 0.22 },
      'moment-fill': { fill: c.bendingTint },
      'moment-hatch': { stroke: c.bendingHatch, width: 0.13 },
      'status-green': filled(c.green),
      'status-amber': filled(c.amber),
      'status-red': filled(c.red),
      'status-none': { stroke: c.quiet, width: 0.3, fill: 'none', ink: c.quiet },
      selection: { stroke: c.selection, width: 3, cap: 'round', fill: c.selection },
      pin: { stroke: c.ink, width: 0.25, fill: c.paper },
      stud: { stroke: c.ink, width: 0.2, fill: c.ink },
      benchmark: { ...thin, fill: c.paper, ink: c.quiet },
      text: { ink: c.ink },
      'text-strong': { ink: c.ink, strong: true },
      'text-quiet': { ink: c.quiet },
      axis: { stroke: c.faint, width: 0.18 },
      leader: quietLine,
      series: { stroke: c.movement, width: 0.4, fill: c.movement, ink: c.movement },
      'series-moment': { stroke: c.bending, width: 0.4, fill: c.bending, ink: c.bending },
      'series-other': { stroke: c.rule, width: 0.25, fill: c.rule, ink: c.quiet },
      fit: { stroke: c.quiet, width: 0.25, dash: [1.6, 1] },
      band: { fill: c.bandTint },
      'trigger-amber': { stroke: c.amber, width: 0.3, dash: [2.2, 1], ink: c.amber },
      'trigger-red': { stroke: c.red, width: 0.3, ink: c.red },
      load: { stroke: c.quiet, width: 0.18, fill: c.quiet, ink: c.quiet },
      column: { stroke: c.ink, width: 0.2, fill: c.ink },
      'text-moment': { ink: c.bending },
      'text-settlement': { ink: c.movement, strong: true },
      paper: { fill: c.paper },
    },
  }
}
