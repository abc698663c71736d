import { execFileSync } from 'node:child_process'
import { describe, expect, it } from 'vitest'
import { findProgram } from '#scripts/start/debian.mjs'
import { labOfBytes } from '#shared/color/difference.ts'
import { readoutsOf } from '#shared/color/readouts.ts'
import { oklchOf } from '#shared/color/to-oklch.ts'
import { Dice } from '#tests/unit/checks/random-system.ts'

/**
 * Little CMS 2.14 (`transicc` of Debian's liblcms2-utils), a color management system in C with an sRGB profile of its
 * own. It prints four decimals. Its white D50 is the ICC's 0.9642, 1, 0.8249, ours CSS's, computed from x 0.3457,
 * y 0.3585; hence the wider tolerances there.
 */
type Triple = readonly [number, number, number]
const RELATIVE = ['-t1']
/** Absolute, without adaptation: the white stays D65. */
const UNADAPTED = ['-t3', '-d0']

const dice = new Dice(312)
const LEVELS = [0, 1, 128, 254, 255]
const COLORS: readonly Triple[] = [
  ...LEVELS.flatMap((r) => LEVELS.flatMap((g) => LEVELS.map((b): Triple => [r, g, b]))),
  ...Array.from({ length: 300 }, (): Triple => [dice.upTo(256), dice.upTo(256), dice.upTo(256)]),
]

/** All colors in one process, a line each. */
function littleCms(output: '*Lab' | '*XYZ', intent: readonly string[]): Triple[] {
  const transicc = findProgram('transicc')
  if (transicc === undefined) throw new Error('install liblcms2-utils, or run npm test')
  const said = execFileSync(transicc, ['-n', '-c0', '-i*sRGB', `-o${output}`, ...intent], {
    input: COLORS.map((color) => `${color.join(' ')}\n`).join(''),
    encoding: 'utf8',
    stdio: ['pipe', 'pipe', 'ignore'],
  })
  return said
    .trim()
    .split('\n')
    .map((line) => {
      const [x, y, z] = line.trim().split(/\s+/).map(Number)
      return [x!, y!, z!]
    })
}

function readoutsOfBytes([r, g, b]: Triple) {
  const reading = oklchOf({ space: 'srgb', components: [r / 255, g / 255, b / 255], alpha: 1 })
  if (!reading.ok) throw new Error(reading.reason)
  return readoutsOf(reading.color)
}

function widest(theirs: readonly Triple[], ours: (color: Triple) => readonly (number | null)[]) {
  expect(theirs).toHaveLength(COLORS.length)
  const differences = COLORS.flatMap((color, at) =>
    ours(color).map((part, component) => Math.abs(part! - theirs[at]![component]!)),
  )
  return Math.max(...differences)
}

const hundredfold = (parts: readonly (number | null)[]) => parts.map((part) => part! * 100)

describe('425 sRGB colors through a color management system', () => {
  it('answers XYZ of white D65 to the digits printed', () => {
    const theirs = littleCms('*XYZ', UNADAPTED)
    const difference = widest(theirs, (color) => hundredfold(readoutsOfBytes(color).xyzD65))
    expect(difference).toBeLessThan(0.0001)
  })

  it('answers XYZ of white D50 within two hundredths of 100', () => {
    const theirs = littleCms('*XYZ', RELATIVE)
    const difference = widest(theirs, (color) => hundredfold(readoutsOfBytes(color).xyzD50))
    expect(difference).toBeLessThan(0.022)
  })

  it('answers Lab of white D50 within a hundredth', () => {
    const difference = widest(littleCms('*Lab', RELATIVE), (color) => readoutsOfBytes(color).lab)
    expect(difference).toBeLessThan(0.01)
  })

  // Lab of XYZ as ISO/CIE 11664-4 has it; the white is theirs too.
  it('answers Lab of white D65, in which differences are measured, from their XYZ', () => {
    const theirs = littleCms('*XYZ', UNADAPTED)
    const white = theirs[COLORS.findIndex((color) => color.join() === '255,255,255')]!
    const root = (t: number) =>
      t > (6 / 29) ** 3 ? Math.cbrt(t) : t / (3 * (6 / 29) ** 2) + 4 / 29
    const lab = theirs.map((xyz): Triple => {
      const [x, y, z] = [root(xyz[0] / white[0]), root(xyz[1] / white[1]), root(xyz[2] / white[2])]
      return [116 * y - 16, 500 * (x - y), 200 * (y - z)]
    })
    const difference = widest(lab, (color) => {
      const { l, a, b } = labOfBytes(...color)
      return [l, a, b]
    })
    expect(difference).toBeLessThan(0.005)
  })
})
