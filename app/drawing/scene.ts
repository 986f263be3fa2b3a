/**
 * A drawing as plain data: primitives with ids and roles, geometry in drawing millimetres (x to the right, y
 * down, as on the sheet), no colours and no fonts. A theme maps roles to resolved values; svg.ts and the
 * window's Sheet walk the same scene, so that window, report and command line show one drawing.
 */
import type { Status } from '../model/findings.ts'

/** What a primitive stands for; the theme gives each its ink. */
export type Role =
  | 'member' // a member of which nothing is said: none assessed, or no capacity given
  | 'member-green'
  | 'member-amber'
  | 'member-red'
  | 'ground' // ground line and hatching
  | 'footing'
  | 'grid' // grid bubble and its line
  | 'dimension'
  | 'level' // level mark
  | 'settlement' // the ground's movement: arrows, discs
  | 'deformed' // the deformed line
  | 'contour'
  | 'tilt'
  | 'moment' // outline of the moment diagram
  | 'moment-fill'
  | 'moment-hatch'
  | 'status-green'
  | 'status-amber'
  | 'status-red'
  | 'status-none'
  | 'selection'
  | 'pin'
  | 'stud'
  | 'benchmark'
  | 'text'
  | 'text-strong'
  | 'text-quiet'
  | 'axis' // guides the eye: gridlines of a chart
  | 'leader'
  | 'series' // a movement against time
  | 'series-moment' // a moment, or what it makes of a member, against time
  | 'series-other' // what is shown beside the one that is spoken of
  | 'fit'
  | 'band'
  | 'trigger-amber'
  | 'trigger-red'
  | 'load'
  | 'settlement-disc' // a support on the plan, its area by its settlement
  | 'settlement-rise' // one that has risen
  | 'settlement-estimated' // one that was not measured
  | 'column' // a column on the plan
  | 'text-moment'
  | 'text-settlement'
  | 'paper' // covers what lies beneath, so that a text on it can be read

/** The thing in the building that a primitive shows; picking it selects that thing. */
export type Target =
  | { kind: 'support'; id: string }
  | { kind: 'line'; id: string }
  | { kind: 'span'; line: string; from: string; to: string }
  | { kind: 'member'; line: string; id: string; end?: 'from' | 'to' }
  | { kind: 'node'; line: string; id: string }

interface Common {
  role: Role
  /** Unique in the scene where given. */
  id?: string
  target?: Target
  /** Short text shown on hover and read by a screen reader. */
  label?: string
  /** Share of the role's line width, where a drawing is so small that full lines would run together. */
  weight?: number
}

export type Point = readonly [x: number, y: number]

export type Primitive =
  | (Common & { shape: 'line'; from: Point; to: Point })
  | (Common & { shape: 'polyline'; points: readonly Point[]; closed?: boolean })
  /** SVG path data made by a helper of this layer, coordinates in drawing mm */
  | (Common & { shape: 'path'; d: readonly PathStep[] })
  | (Common & { shape: 'circle'; centre: Point; radius: number })
  | (Common & { shape: 'mark'; status: Status; centre: Point; size: number })
  /** Placed by its baseline. Size is the text height in drawing mm. */
  | (Common & {
      shape: 'text'
      at: Point
      text: string
      anchor: 'start' | 'middle' | 'end'
      size: number
      turn?: number
    })
  | (Common & { shape: 'group'; children: readonly Primitive[] })

export type PathStep =
  { to: 'move' | 'line'; at: Point } | { to: 'curve'; c1: Point; c2: Point; at: Point } | { to: 'close' }

export interface Scene {
  /** Drawing mm. */
  width: number
  height: number
  /** One sentence for those who cannot see the drawing. */
  title: string
  primitives: readonly Primitive[]
}
