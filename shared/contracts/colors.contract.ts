import * as z from 'zod'
import { HUE_METHODS, MIX_SPACES } from '#shared/color/mix.ts'
import { DEFICIENCIES, SIMULATION_MODELS } from '#shared/color/simulate.ts'
import { readoutsExample, readoutsSchema } from './color-readouts.ts'
import { colorValueSchema, dtcgColorSchema } from './fields.ts'
import { hexSchema, ratioSchema } from './findings.ts'
import { WRITE_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

/** What every operation on bare colours has in common: whoever is known may call it, and nothing is stored. */
const ARITHMETIC = { method: 'POST', feature: 'colors', access: 'known' } as const
const PROBLEMS = WRITE_PROBLEMS

const partSchema = z.number().min(0).max(1)
const shown = {
  color: dtcgColorSchema.meta({ description: 'In OKLCH, unrounded' }),
  hex: hexSchema,
}

export const convertColor = defineContract({
  ...ARITHMETIC,
  operationId: 'convertColor',
  path: '/v1/colors/convert',
  summary: 'A colour in every space, and as it ships',
  description:
    'Spaces that hold every colour read the colour as given; HSL, HSV, HWB, luminance, luma and CMYK read it as it ships in sRGB.',
  body: z.strictObject({ color: colorValueSchema }).meta({ id: 'ConvertColor' }),
  bodyExample: { color: '#2283c1' },
  success: { status: 200, body: readoutsSchema, example: readoutsExample },
  problems: PROBLEMS,
})

const requirementMet = z.strictObject({
  use: z.enum(['text', 'large-text', 'non-text']),
  level: z.enum(['AA', 'AAA']),
  required: z.number(),
  met: z.boolean(),
})

export const contrastColors = defineContract({
  ...ARITHMETIC,
  operationId: 'contrastColors',
  path: '/v1/colors/contrast',
  summary: 'The WCAG contrast ratio of two colours as they ship',
  description:
    'Layers are composited on gamma-coded bytes and rounded after each; the ratio never is. A translucent background needs an opaque ground.',
  body: z
    .strictObject({
      foreground: colorValueSchema,
      background: colorValueSchema,
      ground: colorValueSchema.optional(),
    })
    .meta({ id: 'ContrastColors' }),
  bodyExample: { foreground: '#ffffff', background: '#2283c1' },
  success: {
    status: 200,
    body: z
      .strictObject({
        ratio: ratioSchema,
        foreground: z.strictObject({ hex: hexSchema, relativeLuminance: z.number() }),
        background: z.strictObject({ hex: hexSchema, relativeLuminance: z.number() }),
        requirements: z.array(requirementMet),
      })
      .meta({ id: 'Contrast', description: 'Hexes and luminances after compositing' }),
    example: {
      ratio: 4.1301,
      foreground: { hex: '#ffffff', relativeLuminance: 1 },
      background: { hex: '#2283c1', relativeLuminance: 0.2042 },
      requirements: [{ use: 'text', level: 'AA', required: 4.5, met: false }],
    },
  },
  problems: PROBLEMS,
})

export const mixColor = defineContract({
  ...ARITHMETIC,
  operationId: 'mixColor',
  path: '/v1/colors/mix',
  summary: 'Two colours mixed by the rules of CSS color-mix',
  body: z
    .strictObject({
      first: colorValueSchema,
      second: colorValueSchema,
      part: partSchema.default(0.5).meta({ description: 'Of the second colour', default: 0.5 }),
      space: z.enum(MIX_SPACES).default('oklab').meta({ default: 'oklab' }),
      hue: z.enum(HUE_METHODS).default('shorter').meta({
        description: 'Which way round, where the space has a hue',
        default: 'shorter',
      }),
    })
    .meta({ id: 'MixColor' }),
  bodyExample: { first: 'teal', second: 'olive', part: 0.35, space: 'lch' },
  success: {
    status: 200,
    body: z
      .strictObject({
        mixed: dtcgColorSchema.meta({ description: 'In the space of the mix' }),
        ...shown,
      })
      .meta({ id: 'MixedColor' }),
    example: {
      mixed: { colorSpace: 'lch', components: [49.4431, 40.4806, 162.5459], alpha: 1 },
      color: { colorSpace: 'oklch', components: [0.5512, 0.1132, 163.5208], alpha: 1 },
      hex: '#14865f',
    },
  },
  problems: PROBLEMS,
})

const rampStepSchema = z.strictObject({
  ...shown,
  ratio: ratioSchema.meta({ description: 'To the ground' }),
  wanted: z.number().optional(),
  short: z
    .boolean()
    .optional()
    .meta({ description: 'True where neither black nor white reaches it' }),
})

export const rampColor = defineContract({
  ...ARITHMETIC,
  operationId: 'rampColor',
  path: '/v1/colors/ramp',
  summary: 'A scale of one hue, by contrast ratios to a ground or by even OKLCH lightness',
  body: z
    .strictObject({
      seed: colorValueSchema,
      ground: colorValueSchema.meta({ description: 'Opaque' }),
      ratios: z.array(z.number().min(1).max(21)).min(1).max(50).optional(),
      lightness: z
        .strictObject({ steps: z.int().min(2).max(50), from: partSchema, to: partSchema })
        .optional(),
    })
    .superRefine(({ ratios, lightness }, context) => {
      if ((ratios === undefined) !== (lightness === undefined)) return
      context.addIssue({ code: 'custom', message: 'Give either ratios or lightness' })
    })
    .meta({ id: 'RampColor', description: 'Either ratios or lightness' }),
  bodyExample: { seed: 'oklch(0.585 0.128 243)', ground: '#ffffff', ratios: [3, 4.5, 7] },
  success: {
    status: 200,
    body: z.strictObject({ steps: z.array(rampStepSchema) }).meta({ id: 'Ramp' }),
    example: {
      steps: [
        {
          color: { colorSpace: 'oklch', components: [0.565, 0.128, 243], alpha: 1 },
          hex: '#197cbb',
          ratio: 4.5239,
          wanted: 4.5,
        },
      ],
    },
  },
  problems: PROBLEMS,
})

const simulationSchema = {
  deficiency: z.enum(DEFICIENCIES),
  severity: partSchema
    .default(1)
    .meta({ description: '0 none, 1 the cone is missing', default: 1 }),
  model: z.enum(SIMULATION_MODELS).default('machado-2009').meta({
    description: 'vienot-1999 knows protan and deutan at severity 1 only',
    default: 'machado-2009',
  }),
}

export const simulateColor = defineContract({
  ...ARITHMETIC,
  operationId: 'simulateColor',
  path: '/v1/colors/simulate',
  summary: 'A colour as it may look with a colour-vision deficiency',
  description: 'On linear light of the colour as it ships in sRGB; alpha stays.',
  body: z
    .strictObject({ color: colorValueSchema, ...simulationSchema })
    .superRefine(({ model, deficiency, severity }, context) => {
      if (model !== 'vienot-1999' || (deficiency !== 'tritan' && severity === 1)) return
      const message = 'vienot-1999 defines protan and deutan at severity 1 only'
      context.addIssue({ code: 'custom', path: ['model'], message })
    })
    .meta({ id: 'SimulateColor' }),
  bodyExample: { color: '#ff0000', deficiency: 'protan' },
  success: {
    status: 200,
    body: z
      .strictObject({
        hex: hexSchema,
        simulated: hexSchema,
        deficiency: z.enum(DEFICIENCIES),
        severity: z.number(),
        model: z.enum(SIMULATION_MODELS),
      })
      .meta({ id: 'SimulatedColor' }),
    example: {
      hex: '#ff0000',
      simulated: '#6d5f00',
      deficiency: 'protan',
      severity: 1,
      model: 'machado-2009',
    },
  },
  problems: PROBLEMS,
})

export const nearestColor = defineContract({
  ...ARITHMETIC,
  operationId: 'nearestColor',
  path: '/v1/colors/nearest-passing',
  summary: 'The colour nearest to one that has required ratios to others; hue and alpha kept',
  body: z
    .strictObject({
      color: colorValueSchema,
      against: z
        .array(
          z.strictObject({
            color: colorValueSchema.meta({ description: 'Opaque' }),
            required: z.number().min(1).max(21),
          }),
        )
        .min(1)
        .max(50),
    })
    .meta({ id: 'NearestColor' }),
  bodyExample: { color: '#2283c1', against: [{ color: '#ffffff', required: 4.5 }] },
  success: {
    status: 200,
    body: z
      .strictObject({
        found: z.union([
          z.strictObject({
            ...shown,
            deltaEOk: z.number().meta({ description: 'Between both as they ship' }),
            ratios: z.array(ratioSchema),
          }),
          z.null(),
        ]),
        conflict: z.array(z.int()).meta({
          description:
            'Positions of the fewest in against that no colour of the hue meets together',
        }),
        evaluations: z.int(),
        stopped: z.boolean().meta({ description: 'Whether the budget of evaluations ran out' }),
      })
      .meta({ id: 'NearestColorFound' }),
    example: {
      found: {
        color: { colorSpace: 'oklch', components: [0.5644, 0.1269, 242.6723], alpha: 1 },
        hex: '#197cba',
        deltaEOk: 0.0223,
        ratios: [4.5323],
      },
      conflict: [],
      evaluations: 1238,
      stopped: false,
    },
  },
  problems: PROBLEMS,
})
