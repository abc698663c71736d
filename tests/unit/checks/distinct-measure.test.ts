import Color from 'colorjs.io'
import { expect, it } from 'vitest'
import { measureDistinctSet, measureDistinctSets } from '#shared/checks/distinct-measure.ts'
import { MACHADO_2009 } from '#shared/color/deficiency-matrices.ts'
import { pair, system, token, value } from './model-builder.ts'
import { hexAt, resolve } from './reading.ts'

const CHART = {
  coral: '#ff7f50',
  lime: '#32cd32',
  sky: '#87ceeb',
  plum: '#dda0dd',
  sand: '#d2b48c',
}

function bytes(hex: string) {
  const at = (start: number) => Number.parseInt(hex.slice(start, start + 2), 16)
  return { r: at(1), g: at(3), b: at(5) }
}

/** A second implementation: colorjs.io for Lab D65 and CIEDE2000, the published matrix on its linear sRGB. */
function referenceDistance(first: string, second: string, matrix?: readonly number[]): number {
  const seen = (hex: string) => {
    const [r, g, b] = new Color(hex).to('srgb-linear').coords.map(Number)
    if (!matrix) return new Color('srgb-linear', [r!, g!, b!]).to('lab-d65')
    const row = (at: number) => matrix[at]! * r! + matrix[at + 1]! * g! + matrix[at + 2]! * b!
    const encoded = new Color('srgb-linear', [row(0), row(3), row(6)]).to('srgb')
    const rounded = encoded.coords.map((part) =>
      Math.round(Math.min(1, Math.max(0, Number(part))) * 255),
    )
    return new Color('srgb', rounded.map((part) => part / 255) as [number, number, number]).to(
      'lab-d65',
    )
  }
  const [a, b] = [seen(first), seen(second)]
  // Its CIEDE2000 reads `lab` coordinates; the white is no part of the formula.
  return new Color('lab', a.coords).deltaE(new Color('lab', b.coords), '2000')
}

it.each([
  ['plain', undefined],
  ['protan', MACHADO_2009.protan[10]],
  ['deutan', MACHADO_2009.deutan[10]],
  ['tritan', MACHADO_2009.tritan[10]],
] as const)('answers the closest couple %s as a second implementation finds it', (view, matrix) => {
  const members = Object.entries(CHART).map(([name, hex]) => ({ name, color: bytes(hex) }))
  const { first, second, deltaE2000 } = measureDistinctSet(members)[view]
  const couples = Object.entries(CHART).flatMap(([a, hexA], at) =>
    Object.entries(CHART)
      .slice(at + 1)
      .map(([b, hexB]) => ({ a, b, distance: referenceDistance(hexA, hexB, matrix) })),
  )
  const closest = couples.toSorted((a, b) => a.distance - b.distance)[0]!
  expect([first, second]).toEqual([closest.a, closest.b])
  expect(Math.abs(deltaE2000 - closest.distance)).toBeLessThan(0.001)
})

it('answers a red and a green as far apart plain and close together for deutan', () => {
  const members = [
    { name: 'arrived', color: bytes('#6b8e23') },
    { name: 'late', color: bytes('#b5651d') },
  ]
  const { plain, deutan } = measureDistinctSet(members)
  expect(plain.deltaE2000).toBeGreaterThan(30)
  expect(deutan.deltaE2000).toBeLessThan(plain.deltaE2000 / 3)
})

it('answers 0 for two members of one colour, and names the first such couple', () => {
  const color = bytes('#336699')
  const twins = ['a', 'b', 'c'].map((name) => ({ name, color }))
  expect(measureDistinctSet(twins).tritan).toEqual({ first: 'a', second: 'b', deltaE2000: 0 })
})

it('refuses a set of fewer than two', () => {
  expect(() => measureDistinctSet([])).toThrow(TypeError)
  expect(() => measureDistinctSet([{ name: 'a', color: bytes('#336699') }])).toThrow(TypeError)
})

it('answers each theme of a set, what is translucent composited on its ground', () => {
  const model = {
    ...system({
      tokens: [
        token('veil', '#00000080'),
        token('stone', '#7c7a76', { values: { dark: { rest: value('#ffffff') } } }),
      ],
      pairs: [pair('stone', 'ground')],
    }),
    distinctSets: [{ id: 'd1', name: 'marks', tokens: ['veil', 'stone'] }],
  }
  const [light, dark] = measureDistinctSets(resolve(model))
  expect([light!.theme, dark!.theme]).toEqual(['light', 'dark'])
  const ground = bytes(hexAt(model, 'ground'))
  const over = (byte: number) => Math.floor(byte * (1 - 128 / 255) + 0.5)
  const veil = { r: over(ground.r), g: over(ground.g), b: over(ground.b) }
  const expected = measureDistinctSet([
    { name: 'veil', color: veil },
    { name: 'stone', color: bytes('#7c7a76') },
  ])
  expect(light!.couples).toEqual(expected)
  expect(dark!.couples.plain.deltaE2000).toBeGreaterThan(50)
})
