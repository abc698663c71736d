import * as z from 'zod'
import { THEME_RULE_KINDS } from '#shared/checks/model.ts'
import { aliasSchema, etagSchema, messageSchema, slugSchema, systemParams } from './fields.ts'
import { defineContract } from './route.ts'
import { effectExample, effectSchema } from './findings.ts'
import { EDIT_PROBLEMS, READ_PROBLEMS } from './problems.ts'

/** A token in a rule: its name in braces, or a role of the theme. */
export const referenceSchema = z
  .union([z.enum(['ground', 'ink']), aliasSchema])
  .meta({ id: 'Reference', example: 'ground' })

export const stateRuleSchema = z
  .strictObject({
    lightness: z.number().min(0).max(1).optional().meta({ description: 'Step, 0 to 1' }),
    chroma: z.number().min(0).max(10).optional().meta({ description: 'Factor' }),
    hue: z.number().min(-360).max(360).optional().meta({ description: 'Degrees, added' }),
    alpha: z.number().min(0).max(1).optional().meta({ description: 'Factor' }),
    away: referenceSchema.optional(),
    towards: referenceSchema.optional(),
  })
  .refine((rule) => rule.away === undefined || rule.towards === undefined, {
    message: 'Give away or towards, not both',
  })
  .meta({ id: 'StateRule', example: { lightness: 0.05, away: 'ground' } })
export type StateRuleWire = z.infer<typeof stateRuleSchema>

export const stateRulesSchema = z
  .strictObject({
    hover: stateRuleSchema.optional(),
    active: stateRuleSchema.optional(),
    focus: stateRuleSchema.optional(),
    disabled: stateRuleSchema.optional(),
  })
  .meta({ id: 'StateRules' })

export const themeRuleSchema = z
  .strictObject({
    kind: z.enum(THEME_RULE_KINDS).optional(),
    k: z.number().min(0).max(10).optional().meta({ description: 'Factor of relative' }),
    against: referenceSchema
      .optional()
      .meta({ description: 'What match-contrast measures against' }),
    chroma: z.number().min(0).max(10).optional().meta({ description: 'Factor, in all but keep' }),
    lightness: z.number().min(-1).max(1).optional().meta({ description: 'Added by shift' }),
    hue: z.number().min(-360).max(360).optional().meta({ description: 'Degrees added by shift' }),
  })
  .meta({ id: 'ThemeRule', example: { kind: 'mirror', chroma: 0.92 } })
export type ThemeRuleWire = z.infer<typeof themeRuleSchema>

/** Rules of a token or of a prefix; theme rules by theme key. */
export const ruleScopeSchema = z
  .strictObject({
    states: stateRulesSchema.optional(),
    themes: z.record(slugSchema, themeRuleSchema).optional(),
  })
  .meta({ id: 'RuleScope', example: { themes: { dark: { kind: 'keep' } } } })
export type RuleScopeWire = z.infer<typeof ruleScopeSchema>

export const prefixRulesSchema = ruleScopeSchema
  .extend({
    prefix: z
      .string()
      .min(1)
      .max(255)
      .meta({ description: 'Whole name segments', example: 'action' }),
  })
  .meta({ id: 'PrefixRules' })

const rulesBody = {
  states: stateRulesSchema.meta({ description: 'State rules of the whole system' }),
  prefixes: z.array(prefixRulesSchema).max(200),
}

export const rulesSchema = z.strictObject({ ...rulesBody, etag: etagSchema }).meta({ id: 'Rules' })
export type RulesWire = z.infer<typeof rulesSchema>

export const putRulesBody = z
  .strictObject({ ...rulesBody, message: messageSchema })
  .meta({ id: 'PutRules' })

const example = {
  states: { hover: { lightness: 0.05 }, active: { lightness: 0.1 } },
  prefixes: [{ prefix: 'action', themes: { dark: { kind: 'mirror', chroma: 0.92 } } }],
} as const

export const getRules = defineContract({
  operationId: 'getRules',
  method: 'GET',
  path: '/v1/systems/{system}/rules',
  feature: 'rules',
  summary: 'The state rules of a system and the rules of its name prefixes',
  description:
    'The theme rule of the whole system stands on each theme, rules of one token on the token.',
  params: systemParams,
  success: { status: 200, body: rulesSchema, example: { ...example, etag: '"5b1f"' } },
  problems: READ_PROBLEMS,
  access: 'rules:read',
  conditional: true,
})

export const putRules = defineContract({
  operationId: 'putRules',
  method: 'PUT',
  path: '/v1/systems/{system}/rules',
  feature: 'rules',
  summary: 'Replaces the rules; makes one revision',
  params: systemParams,
  body: putRulesBody,
  bodyExample: { ...example, message: 'Calmer hover' },
  success: {
    status: 200,
    body: rulesSchema.extend({ effect: effectSchema }),
    example: {
      ...example,
      etag: '"77aa"',
      effect: effectExample,
    },
  },
  problems: EDIT_PROBLEMS,
  access: 'rules:write',
  precondition: 'required',
})
