import { createPixel, luminanceOf, type Pixel, paintLayer } from '#shared/checks/layers.ts'
import { nearestColor as findNearest, ratioOnColor } from '#shared/checks/nearest-color.ts'
import { LEVELS } from '#shared/checks/model.ts'
import { requiredRatio } from '#shared/checks/uses.ts'
import { formatHex } from '#shared/color/format-color.ts'
import { contrastRatio } from '#shared/color/luminance.ts'
import { mixColors } from '#shared/color/mix.ts'
import { type RampStep, rampByLightness, rampByRatio } from '#shared/color/ramp.ts'
import { readoutsOf } from '#shared/color/readouts.ts'
import { renderColor } from '#shared/color/render.ts'
import { simulateBytes, simulationMatrix } from '#shared/color/simulate.ts'
import { oklchOf } from '#shared/color/to-oklch.ts'
import { presentReadouts } from '#shared/contracts/color-readouts.ts'
import type {
  contrastColors,
  convertColor,
  mixColor,
  nearestColor,
  rampColor,
  simulateColor,
} from '#shared/contracts/colors.contract.ts'
import type { AnswerOf, ParsedOf } from '#shared/contracts/route.ts'
import type { Contract } from '#shared/contracts/route.ts'
import { ColorReading, shownColor } from './color-reading.ts'

type Body<C extends Contract> = ParsedOf<C>['body']

export function answerConversion(body: Body<typeof convertColor>): AnswerOf<typeof convertColor> {
  const reading = new ColorReading()
  const color = reading.read(body.color, '/color')
  reading.refuseFaulty()
  return presentReadouts(readoutsOf(color))
}

const shownSide = (pixel: Pixel) => ({
  hex: formatHex(pixel.r, pixel.g, pixel.b),
  relativeLuminance: luminanceOf(pixel, 'srgb'),
})

export function answerContrast(body: Body<typeof contrastColors>): AnswerOf<typeof contrastColors> {
  const reading = new ColorReading()
  const foreground = reading.read(body.foreground, '/foreground')
  const background = reading.read(body.background, '/background')
  const ground = body.ground === undefined ? undefined : reading.readOpaque(body.ground, '/ground')
  if (ground === undefined && renderColor(background).a < 255) {
    const detail = 'A translucent background needs an opaque ground'
    reading.add({ pointer: '/background', detail })
  }
  reading.refuseFaulty()
  const under = createPixel()
  if (ground !== undefined) paintLayer(under, renderColor(ground), 'srgb')
  paintLayer(under, renderColor(background), 'srgb')
  const over = { ...under }
  paintLayer(over, renderColor(foreground), 'srgb')
  const ratio = contrastRatio(luminanceOf(over, 'srgb'), luminanceOf(under, 'srgb'))
  return {
    ratio,
    foreground: shownSide(over),
    background: shownSide(under),
    requirements: (['text', 'large-text', 'non-text'] as const).flatMap((use) =>
      LEVELS.map((level) => {
        const required = requiredRatio(use, level)
        return { use, level, required, met: ratio >= required }
      }),
    ),
  }
}

export function answerMix(body: Body<typeof mixColor>): AnswerOf<typeof mixColor> {
  const reading = new ColorReading()
  const first = reading.readSpaced(body.first, '/first')
  const second = reading.readSpaced(body.second, '/second')
  reading.refuseFaulty()
  const { part, space, hue } = body
  const mixed = mixColors(first, second, { part, space, hue })
  const stored = oklchOf(mixed)
  if (!stored.ok) {
    reading.add({ pointer: '', detail: `The mix is no colour that can be kept. ${stored.reason}` })
    reading.refuseFaulty()
    throw new TypeError('A reading with a fault is refused')
  }
  return {
    mixed: {
      colorSpace: space,
      components: mixed.components.map((component) => component ?? ('none' as const)),
      alpha: mixed.alpha ?? 0,
    },
    ...shownColor(stored.color),
  }
}

const shownStep = ({ color, ratio, wanted, isShort }: RampStep) => ({
  ...shownColor(color),
  ratio,
  ...(wanted === undefined ? {} : { wanted }),
  ...(isShort === undefined ? {} : { short: isShort }),
})

export function answerRamp(body: Body<typeof rampColor>): AnswerOf<typeof rampColor> {
  const reading = new ColorReading()
  const from = {
    seed: reading.read(body.seed, '/seed'),
    ground: reading.readOpaque(body.ground, '/ground'),
  }
  reading.refuseFaulty()
  const { ratios = [], lightness } = body
  const steps = lightness ? rampByLightness(from, lightness) : rampByRatio(from, ratios)
  return { steps: steps.map(shownStep) }
}

export function answerSimulation(body: Body<typeof simulateColor>): AnswerOf<typeof simulateColor> {
  const reading = new ColorReading()
  const color = reading.read(body.color, '/color')
  reading.refuseFaulty()
  const { deficiency, severity, model } = body
  const { r, g, b, a } = renderColor(color)
  const seen = simulateBytes({ r, g, b }, simulationMatrix({ deficiency, severity, model }))
  return {
    hex: formatHex(r, g, b, a),
    simulated: formatHex(seen.r, seen.g, seen.b, a),
    deficiency,
    severity,
    model,
  }
}

export function answerNearest(body: Body<typeof nearestColor>): AnswerOf<typeof nearestColor> {
  const reading = new ColorReading()
  const color = reading.read(body.color, '/color')
  const demands = body.against.map((side, at) => ({
    color: reading.readOpaque(side.color, `/against/${at}/color`),
    required: side.required,
  }))
  reading.refuseFaulty()
  const { found, conflict, evaluations, isStopped } = findNearest(color, demands)
  return {
    found: found
      ? {
          ...shownColor(found.color),
          deltaEOk: found.deltaEOk,
          ratios: demands.map((side) =>
            ratioOnColor(renderColor(found.color), renderColor(side.color)),
          ),
        }
      : null,
    conflict: [...conflict],
    evaluations,
    stopped: isStopped,
  }
}
