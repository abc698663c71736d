import * as z from 'zod'
import { OUTCOMES, USES } from '#shared/checks/model.ts'
import { idSchema, instantSchema, slugSchema, stateSchema } from './fields.ts'

export const useSchema = z.enum(USES).meta({ id: 'Use', example: 'text' })
export const outcomeSchema = z.enum(OUTCOMES).meta({ id: 'Outcome', example: 'breach' })
export const verdictSchema = z.enum(['pass', 'fail']).meta({ id: 'Verdict', example: 'fail' })
export const ratioSchema = z
  .number()
  .min(1)
  .max(21)
  .meta({ description: 'WCAG 2.x contrast ratio, never rounded', example: 3.8804 })
export const pairStateSchema = z
  .string()
  .regex(/^(rest|hover|active|focus|disabled)\/(rest|hover|active|focus|disabled)$/)
  .meta({ description: 'Foreground state / background state', example: 'rest/hover' })
export const hexSchema = z
  .string()
  .regex(/^#([0-9a-f]{6}|[0-9a-f]{8})$/)
  .meta({
    description: 'sRGB bytes as shipped, eight digits where translucent',
    example: '#2283c1',
  })

export const basisSchema = z.enum(['srgb', 'p3']).meta({
  id: 'Basis',
  description:
    "srgb: the WCAG measure. p3: WCAG's ratio on P3 luminance, outside its definition, where it is the lower one",
})

export const countsSchema = z
  .strictObject({
    pass: z.int(),
    breach: z.int(),
    waived: z.int(),
    exempt: z.int(),
    known: z.int(),
  })
  .meta({ id: 'Counts', example: { pass: 1480, breach: 2, waived: 0, exempt: 96, known: 0 } })

export const findingSchema = z
  .strictObject({
    foreground: z.string(),
    background: z.string(),
    theme: slugSchema,
    state: pairStateSchema,
    use: useSchema,
    ratio: ratioSchema,
    srgbRatio: ratioSchema
      .optional()
      .meta({ description: "WCAG's own measure, where the ratio on P3 luminance decides" }),
    required: z.number().min(0).max(21),
    basis: basisSchema,
    outcome: outcomeSchema,
    reason: z.string().optional(),
    tight: z
      .boolean()
      .optional()
      .meta({ description: 'One level a translucent layer would flip the verdict' }),
    gating: z.boolean(),
    rendered: z.strictObject({ foreground: hexSchema, background: hexSchema }),
    waiver: z.strictObject({ id: idSchema, endsAt: instantSchema }).optional(),
    fingerprint: z
      .string()
      .meta({ description: 'Stable identity of the finding across renames and thresholds' }),
  })
  .meta({ id: 'Finding', description: 'One pair in one theme and state, measured' })
export type FindingWire = z.infer<typeof findingSchema>

export const findingExample = {
  foreground: 'action.board.text',
  background: 'action.board.fill',
  theme: 'light',
  state: 'rest/rest',
  use: 'text',
  ratio: 3.8804,
  required: 4.5,
  basis: 'srgb',
  outcome: 'breach',
  gating: true,
  rendered: { foreground: '#faf8f2', background: '#2283c1' },
  fingerprint: '0f6a1c7be2d94835',
} as const

export const engineSchema = z
  .strictObject({ version: z.string(), gamutMap: z.string(), ruleSet: z.string() })
  .meta({
    id: 'Engine',
    description: 'What computed a verdict',
    example: {
      version: '1.0.0',
      gamutMap: 'css-color-4-binary-search-local-minde',
      ruleSet: 'wcag-2.2',
    },
  })

export const advisorySchema = z
  .strictObject({
    code: z.enum(['double-flip', 'state-invisible']),
    token: z.string(),
    theme: slugSchema.optional(),
    state: stateSchema.optional(),
  })
  .meta({ id: 'Advisory', description: 'Worth a look; never a breach' })
export type AdvisoryWire = z.infer<typeof advisorySchema>

const coupleSchema = z
  .strictObject({ first: z.string(), second: z.string(), deltaE2000: z.number().min(0) })
  .meta({ id: 'ClosestCouple', description: 'The two members hardest to tell apart' })

export const distinctMeasureSchema = z
  .strictObject({
    id: idSchema,
    name: z.string(),
    theme: slugSchema,
    plain: coupleSchema,
    protan: coupleSchema,
    deutan: coupleSchema,
    tritan: coupleSchema,
  })
  .meta({
    id: 'DistinctMeasure',
    description:
      'A distinct set in one theme, at rest on its ground: CIEDE2000 of its closest couple, as it is and as simulated by Machado 2009 at severity 1. It never gates.',
  })
export type DistinctMeasureWire = z.infer<typeof distinctMeasureSchema>

const couple = { first: 'chart.route.2', second: 'chart.route.5' } as const
export const distinctMeasureExample = {
  id: 'dst_01jd5w7k2m',
  name: 'Routes of the chart',
  theme: 'light',
  plain: { ...couple, deltaE2000: 21.0482 },
  protan: { ...couple, deltaE2000: 9.6613 },
  deutan: { ...couple, deltaE2000: 7.1106 },
  tritan: { ...couple, deltaE2000: 15.3027 },
} as const

/** What a direct write did to the head. */
export const effectSchema = z
  .strictObject({
    revision: z.int().min(0),
    verdict: verdictSchema,
    opened: z.array(findingSchema).meta({ description: 'Breaches that this write opened' }),
    resolved: z.array(findingSchema).meta({ description: 'Findings that breached before it' }),
  })
  .meta({ id: 'Effect', description: 'The revision a write made and how the verdict moved' })

export const effectExample = { revision: 215, verdict: 'pass', opened: [], resolved: [] } as const
