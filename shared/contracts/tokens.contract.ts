import * as z from 'zod'
import {
  cursorSchema,
  derivedStateSchema,
  dtcgColorSchema,
  etagSchema,
  idSchema,
  messageSchema,
  openLimitSchema,
  slugSchema,
  systemParams,
  themeValuesInputSchema,
  themeValuesSchema,
  tokenNameSchema,
  valueInputSchema,
  valueSchema,
} from './fields.ts'
import { effectExample, effectSchema, hexSchema, outcomeSchema, ratioSchema } from './findings.ts'
import { EDIT_PROBLEMS, READ_PROBLEMS, REVISION_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'
import { ruleScopeSchema } from './rules.contract.ts'

export const provenanceSchema = z
  .looseObject({
    from: z.string().meta({
      description: 'source, override, alias, derived, state-rule or theme-rule',
      example: 'state-rule',
    }),
    text: z.string().meta({ example: 'hover: 0.05 towards ink' }),
  })
  .meta({ id: 'Provenance', description: 'How a value came about' })

export const resolvedColorSchema = z
  .strictObject({
    oklch: dtcgColorSchema,
    hex: hexSchema,
    p3: dtcgColorSchema,
    gamut: z
      .enum(['srgb', 'p3', 'beyond'])
      .meta({ description: 'The smallest gamut that holds the unmapped colour' }),
    provenance: provenanceSchema,
  })
  .meta({ id: 'ResolvedColor' })
export type ResolvedColorWire = z.infer<typeof resolvedColorSchema>

const resolvedStatesSchema = z
  .strictObject({
    rest: resolvedColorSchema,
    hover: resolvedColorSchema.optional(),
    active: resolvedColorSchema.optional(),
    focus: resolvedColorSchema.optional(),
    disabled: resolvedColorSchema.optional(),
  })
  .meta({ id: 'ResolvedStates' })

export const deprecationSchema = z
  .strictObject({
    reason: z.string().trim().min(1).max(500).optional(),
    replacement: tokenNameSchema.optional(),
    sunset: z.iso.date('Expected a day, such as 2026-11-24').optional(),
  })
  .meta({ id: 'Deprecation', example: { reason: 'Renamed', replacement: 'action.board.fill' } })

export const tokenSchema = z
  .strictObject({
    id: idSchema,
    name: tokenNameSchema,
    description: z.string().optional(),
    value: valueSchema,
    states: z.array(derivedStateSchema).meta({ description: 'Besides rest' }),
    values: themeValuesSchema.meta({ description: 'Overrides by theme and state' }),
    rules: ruleScopeSchema.optional(),
    locked: z.boolean(),
    deprecated: deprecationSchema.optional(),
    resolved: z.record(slugSchema, resolvedStatesSchema),
    etag: etagSchema,
  })
  .meta({ id: 'Token' })
export type TokenWire = z.infer<typeof tokenSchema>

export const markSchema = z
  .enum(['breach', 'breach-on-it', 'waived', 'exempt'])
  .nullable()
  .meta({ type: ['string', 'null'], description: 'breach-on-it: only as the background' })

/** How a token stands among its pairs on the head. */
export const standingSchema = z
  .strictObject({
    pairs: z.int().meta({ description: 'Declared pairs that name it' }),
    pairsThroughAliases: z
      .int()
      .meta({ description: 'Further pairs, through tokens that follow it' }),
    breaches: z.int().meta({ description: 'Breaching findings, as foreground or background' }),
    mark: markSchema,
    waivedUntil: z.string().optional(),
    lowest: z
      .union([
        z.strictObject({
          ratio: ratioSchema,
          required: z.number(),
          theme: slugSchema,
          state: z.string(),
          outcome: outcomeSchema,
          foreground: z.string(),
          background: z.string(),
        }),
        z.null(),
      ])
      .meta({ description: 'The finding furthest short, or nearest to its line' }),
  })
  .meta({ id: 'Standing' })
export type StandingWire = z.infer<typeof standingSchema>

export const ledgerTokenSchema = tokenSchema.extend({ standing: standingSchema }).meta({
  id: 'LedgerToken',
})
export type LedgerTokenWire = z.infer<typeof ledgerTokenSchema>

/** One band of the strip. */
export const stripTokenSchema = z
  .strictObject({
    name: tokenNameSchema,
    hexes: z.record(slugSchema, hexSchema).meta({
      description: 'Rest colour in the base theme and in the first theme of opposite polarity',
    }),
    mark: markSchema,
    themes: z.array(slugSchema).meta({ description: 'Themes in which it breaches' }),
  })
  .meta({ id: 'StripToken' })
export type StripTokenWire = z.infer<typeof stripTokenSchema>

const editable = {
  description: z.string().trim().max(1000).optional(),
  states: z.array(derivedStateSchema).max(4).optional(),
  values: themeValuesInputSchema.optional(),
  rules: ruleScopeSchema.optional(),
  locked: z.boolean().optional(),
  deprecated: deprecationSchema.optional(),
}

export const createTokenBody = z
  .strictObject({
    name: tokenNameSchema,
    value: valueInputSchema,
    ...editable,
    message: messageSchema,
  })
  .meta({ id: 'CreateToken' })

export const patchTokenBody = z
  .strictObject({
    name: tokenNameSchema.optional(),
    value: valueInputSchema.optional(),
    ...editable,
    description: z
      .string()
      .trim()
      .max(1000)
      .nullable()
      .optional()
      .meta({ type: ['string', 'null'] }),
    rules: z.union([ruleScopeSchema, z.null()]).optional(),
    deprecated: z.union([deprecationSchema, z.null()]).optional(),
    message: messageSchema,
  })
  .meta({
    id: 'PatchToken',
    description:
      'Absent members stay; null removes an optional one; states and values are replaced whole',
  })

const resolvedExample = {
  oklch: { colorSpace: 'oklch', components: [0.585, 0.128, 243], alpha: 1 },
  hex: '#2283c1',
  p3: { colorSpace: 'display-p3', components: [0.2666, 0.5058, 0.7411], alpha: 1 },
  gamut: 'srgb',
  provenance: { from: 'source', text: 'source' },
} as const

export const tokenExample = {
  id: 'tok_01jd5w7k2m',
  name: 'action.board.fill',
  description: 'Background of the board button',
  value: { colorSpace: 'oklch', components: [0.585, 0.128, 243], alpha: 1 },
  states: [],
  values: {},
  locked: false,
  resolved: { light: { rest: resolvedExample } },
  etag: '"c1d2"',
} as const

const writtenToken = tokenSchema.extend({ effect: effectSchema }).meta({ id: 'WrittenToken' })
const tokenParams = systemParams.extend({
  name: z.string().min(1).max(255).meta({ example: 'action.board.fill' }),
})

export const listTokens = defineContract({
  operationId: 'listTokens',
  method: 'GET',
  path: '/v1/systems/{system}/tokens',
  feature: 'tokens',
  summary: 'The tokens in ledger order, resolved, with how each stands among its pairs',
  description: 'With view=ledger: name, two hexes and mark of every token in one answer.',
  params: systemParams,
  query: z.strictObject({
    view: z.enum(['full', 'ledger']).default('full'),
    named: z.string().max(255).optional().meta({ description: 'Part of a name' }),
    group: z.string().max(255).optional().meta({ description: 'First name segment' }),
    mark: z.enum(['breach', 'breach-on-it', 'waived', 'exempt', 'none']).optional(),
    sort: z.enum(['ledger', 'name', 'lowest']).default('ledger'),
    limit: openLimitSchema(500, 'Absent: 100, and with view=ledger all'),
    cursor: cursorSchema,
  }),
  success: {
    status: 200,
    body: z.strictObject({
      items: z.union([z.array(ledgerTokenSchema), z.array(stripTokenSchema)]),
    }),
    example: {
      items: [
        {
          ...tokenExample,
          standing: { pairs: 0, pairsThroughAliases: 0, breaches: 0, mark: null, lowest: null },
        },
      ],
    },
  },
  problems: READ_PROBLEMS,
  access: 'tokens:read',
  conditional: true,
})

export const createToken = defineContract({
  operationId: 'createToken',
  method: 'POST',
  path: '/v1/systems/{system}/tokens',
  feature: 'tokens',
  summary: 'Adds a token at the end of the ledger; makes one revision',
  params: systemParams,
  body: createTokenBody,
  bodyExample: {
    name: 'action.board.fill',
    value: 'oklch(0.585 0.128 243)',
    states: ['hover', 'active', 'focus', 'disabled'],
    message: 'Board button',
  },
  success: { status: 201, body: writtenToken, example: { ...tokenExample, effect: effectExample } },
  problems: [...REVISION_PROBLEMS, 'token-name-taken'],
  access: 'tokens:write',
})

export const getToken = defineContract({
  operationId: 'getToken',
  method: 'GET',
  path: '/v1/systems/{system}/tokens/{name}',
  feature: 'tokens',
  summary: 'One token, resolved in every theme and state',
  params: tokenParams,
  success: { status: 200, body: tokenSchema, example: tokenExample },
  problems: READ_PROBLEMS,
  access: 'tokens:read',
  conditional: true,
})

export const patchToken = defineContract({
  operationId: 'patchToken',
  method: 'PATCH',
  path: '/v1/systems/{system}/tokens/{name}',
  feature: 'tokens',
  summary: 'Edits or renames a token; aliases follow a rename; makes one revision',
  params: tokenParams,
  body: patchTokenBody,
  bodyExample: { value: 'oklch(0.551 0.128 243)', message: 'Dark enough for its label' },
  success: { status: 200, body: writtenToken, example: { ...tokenExample, effect: effectExample } },
  problems: [...EDIT_PROBLEMS, 'token-name-taken', 'token-locked'],
  access: 'tokens:write',
  precondition: 'required',
})

export const deleteToken = defineContract({
  operationId: 'deleteToken',
  method: 'DELETE',
  path: '/v1/systems/{system}/tokens/{name}',
  feature: 'tokens',
  summary: 'Deletes a token that nothing uses; makes one revision',
  params: tokenParams,
  query: z.strictObject({ message: messageSchema }),
  success: { status: 204 },
  problems: [...EDIT_PROBLEMS, 'token-in-use', 'token-locked'],
  access: 'tokens:write',
  precondition: 'required',
})
