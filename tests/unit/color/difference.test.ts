import { expect, it } from 'vitest'
import { areApartInLightness, deltaE2000, labOfBytes } from '#shared/color/difference.ts'
import { cieLightness, relativeLuminance } from '#shared/color/luminance.ts'

type Bytes = [number, number, number]

/** Every colour of a coarse grid, with neighbours at distances around what the eye can tell. */
function* neighbours(): Generator<readonly [Bytes, Bytes]> {
  const grid = [0, 1, 3, 9, 27, 64, 100, 128, 160, 192, 224, 250, 255]
  for (const r of grid)
    for (const g of grid)
      for (const b of grid)
        for (const step of [1, 4, 8, 10, 12, 16, 32])
          for (const [x, y, z] of [
            [1, 1, 1],
            [-1, 1, 0],
            [0, -1, 1],
            [0, 0, 1],
          ] as const) {
            const moved: Bytes = [r + step * x, g + step * y, b + step * z]
            if (moved.every((byte) => byte >= 0 && byte <= 255)) yield [[r, g, b], moved]
          }
}

it('calls two colours apart by their lightness only where CIEDE2000 says so as well', () => {
  const tally = { apart: 0, near: 0 }
  for (const [first, second] of neighbours()) {
    const isApart = areApartInLightness(
      relativeLuminance(...first),
      relativeLuminance(...second),
      2,
    )
    tally[isApart ? 'apart' : 'near'] += 1
    if (isApart) expect(deltaE2000(labOfBytes(...first), labOfBytes(...second))).toBeGreaterThan(2)
  }
  expect(tally.apart).toBeGreaterThan(5000)
  expect(tally.near).toBeGreaterThan(5000)
})

it('answers the L* of culori for grey bytes, within what WCAG’s printed coefficients differ', () => {
  for (let byte = 0; byte < 256; byte += 1) {
    const { l } = labOfBytes(byte, byte, byte)
    expect(cieLightness(relativeLuminance(byte, byte, byte))).toBeCloseTo(l, 1)
  }
})
