import { filterDeficiencyDeuter, filterDeficiencyProt, filterDeficiencyTrit } from 'culori'
import Color from 'colorjs.io'
import { expect, it } from 'vitest'
import { simulateBytes, simulationMatrix } from '#shared/color/simulate.ts'
import { byteOf } from '#shared/color/transfer.ts'
import { Dice } from '#tests/unit/checks/random-system.ts'

/**
 * The matrices of culori 4.0.2, which carries the whole published table, in the linear light of colorjs.io 0.7.1.
 * culori itself multiplies what it is handed, gamma-coded or not, so it is handed linear light.
 */
const FILTERS = {
  protan: filterDeficiencyProt,
  deutan: filterDeficiencyDeuter,
  tritan: filterDeficiencyTrit,
} as const
const STEPS = Array.from({ length: 11 }, (_, step) => step / 10)

it.each(Object.keys(FILTERS) as (keyof typeof FILTERS)[])(
  'answers 2,200 colors for %s at the eleven published severities, to the byte',
  (deficiency) => {
    const dice = new Dice(11)
    const differing: string[] = []
    for (const severity of STEPS) {
      const matrix = simulationMatrix({ model: 'machado-2009', deficiency, severity })
      const filter = FILTERS[deficiency](severity)
      for (let n = 0; n < 200; n++) {
        const [r, g, b] = [dice.upTo(256), dice.upTo(256), dice.upTo(256)]
        const [x, y, z] = new Color('srgb', [r / 255, g / 255, b / 255]).to('srgb-linear').coords
        const seen = filter({ mode: 'rgb', r: x!, g: y!, b: z! })
        const shown = new Color('srgb-linear', [seen.r, seen.g, seen.b]).to('srgb').coords
        const theirs = shown.map((channel) => byteOf(channel!)).join()
        const ours = Object.values(simulateBytes({ r, g, b }, matrix)).join()
        if (ours !== theirs) differing.push(`${severity} ${[r, g, b]}: ${ours} ${theirs}`)
      }
    }
    expect(differing).toEqual([])
  },
)
