/**
 * What one base's settlement, and the ground's tilt, do to a frame: computed once per description, so that each
 * round, each share and each what-if is a small product.
 */
import type { FrameResponse } from '../types.ts'
import type { FactoredFrame } from './factor.ts'
import { emptyResponse, respond } from './respond.ts'

/**
 * Response of the frame to a settlement of 1 m of each base by itself, all others at rest.
 *
 * Case j has base j down by 1 m; every other prescribed movement is 0. Elastic and linear, so the response to
 * settlements w is the sum of w_j times case j.
 *
 * @param f as factorFrame gives it; b bases
 * @returns b cases; shapes, units and signs as FrameResponse, per m of settlement (down positive)
 * @source  displacement method with prescribed displacements, common practice
 */
export function baseInfluence(f: FactoredFrame): FrameResponse {
  const { base, x } = f.frame
  const response = emptyResponse(f, base.length)
  for (let b = 0; b < base.length; b++) response.down[b * x.length + base[b]] = 1
  return respond(f, response)
}

/**
 * Response of the frame to a tilt of the ground by 1 rad clockwise that lifts or lowers no base.
 *
 * Fixed bases turn by 1 rad and so do the ground ends of base springs; every base moves right by
 * (z - mean z of the bases). The vertical part of a tilt is a settlement a + x_b of each base, so
 *
 *     sum over b of (a + x_b) * baseInfluence[b] + tiltResponse
 *
 * moves the frame as a rigid body for any a: no moments, no axial forces, no reactions.
 *
 * @param f as factorFrame gives it
 * @returns 1 case; shapes, units and signs as FrameResponse, per rad (clockwise positive)
 * @source  rigid body kinematics at small rotations, common practice
 */
export function tiltResponse(f: FactoredFrame): FrameResponse {
  const { base, baseSpring, z } = f.frame
  const response = emptyResponse(f, 1)
  let mean = 0
  for (let b = 0; b < base.length; b++) mean += z[base[b]] / base.length
  for (let b = 0; b < base.length; b++) {
    response.right[base[b]] = z[base[b]] - mean
    if (baseSpring[b] === Infinity) response.rotation[base[b]] = 1
  }
  return respond(f, response, undefined, 1)
}
