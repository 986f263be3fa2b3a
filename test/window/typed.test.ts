import { expect, test } from 'vitest'
import { Fault, faultsOf } from '../../app/model/faults.ts'
import { numberOrNothing, numberTyped, rectangleTyped, slopeText, slopeTyped } from '../../renderer/describe/typed.ts'

const BEAM = { kind: 'section', id: 'beam' } as const

test('what is no number names the value and the thing it stands at', () => {
  expect(() => numberTyped('3o', 'E_GPa', BEAM)).toThrow('Section beam: E_GPa: "3o" is no number.')
  expect(() => numberTyped('', 'E_GPa', BEAM)).toThrow(Fault)
  expect(numberOrNothing(' ', 'E_GPa', BEAM)).toBeUndefined()
})

test('a slope is typed as 1/n or as a number and read back as typed', () => {
  expect(slopeTyped('1/500', 'amber')).toBe(0.002)
  expect(slopeTyped('0,00667', 'red')).toBe(0.00667)
  expect(slopeTyped('', 'red')).toBeUndefined()
  expect(slopeText(0.002)).toBe('1/500')
  expect(slopeText(0.00667)).toBe('1/150')
  expect(() => slopeTyped('1/0', 'red')).toThrow('must be above 0')
})

test('a rectangle gives area, second moment and 5/6 of the area for shear', () => {
  // b h, b h^3 / 12 and 5/6 b h of 300 x 600 mm, worked by hand.
  expect(rectangleTyped('300 x 600')).toEqual({ A_cm2: 1800, I_cm4: 540000, shear_area_cm2: 1500 })
  expect(faultsOf(caught(() => rectangleTyped('300')))?.[0]?.code).toBe('number.malformed')
  expect(faultsOf(caught(() => rectangleTyped('300 x 0')))?.[0]?.code).toBe('number.low')
})

function caught(act: () => unknown): unknown {
  try {
    act()
  } catch (error) {
    return error
  }
  return undefined
}
