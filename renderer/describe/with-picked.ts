/** A scene with everything that is picked marked on it, as the one thing selected is. */
import type { Point, Primitive, Scene, Target } from '../../app/drawing/scene.ts'
import { sameThing } from '../assess/targets.ts'

/** Radius of the mark on a support, drawing mm. */
const MARK = 3

export function withPicked(scene: Scene, picked: readonly Target[]): Scene {
  const marks = scene.primitives.flatMap((primitive) => marksOn(primitive, picked))
  return marks.length === 0 ? scene : { ...scene, primitives: [...marks, ...scene.primitives] }
}

function marksOn(primitive: Primitive, picked: readonly Target[]): Primitive[] {
  if (primitive.shape === 'group') return primitive.children.flatMap((child) => marksOn(child, picked))
  const { target, role } = primitive
  if (!target || role === 'selection' || !picked.some((thing) => sameThing(thing, target))) return []
  if (primitive.shape === 'line' && role.startsWith('member'))
    return [{ shape: 'line', role: 'selection', from: primitive.from, to: primitive.to }]
  if (primitive.shape === 'polyline' && role === 'column')
    return [{ shape: 'circle', role: 'selection', centre: centreOf(primitive.points), radius: MARK }]
  return []
}

function centreOf(points: readonly Point[]): Point {
  const sum = points.reduce(([x, y], [px, py]) => [x + px, y + py], [0, 0] as Point)
  return [sum[0] / points.length, sum[1] / points.length]
}
