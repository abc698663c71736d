import * as z from 'zod'
import {
  etagSchema,
  idSchema,
  levelSchema,
  messageSchema,
  slugSchema,
  stateValuesInputSchema,
  stateValuesSchema,
  systemParams,
  tokenNameSchema,
} from './fields.ts'
import { effectExample, effectSchema } from './findings.ts'
import { EDIT_PROBLEMS, READ_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'
import { themeRuleSchema } from './rules.contract.ts'

export const themeSchema = z
  .strictObject({
    id: idSchema,
    key: slugSchema,
    name: z.string(),
    position: z.int().min(0).meta({ description: '0 is the base' }),
    from: slugSchema.optional().meta({ description: 'Parent; absent on the base' }),
    ground: tokenNameSchema,
    ink: tokenNameSchema,
    rule: themeRuleSchema,
    level: levelSchema.optional(),
    gating: z.boolean(),
    values: z.record(tokenNameSchema, stateValuesSchema).meta({
      description: 'What the theme sets itself, by token name and state',
    }),
    etag: etagSchema,
  })
  .meta({ id: 'Theme' })
export type ThemeWire = z.infer<typeof themeSchema>

export const putThemeBody = z
  .strictObject({
    name: z.string().trim().min(1).max(120),
    from: slugSchema.optional().meta({ description: 'Default: the base' }),
    ground: tokenNameSchema,
    ink: tokenNameSchema,
    rule: themeRuleSchema.default({ kind: 'keep' }),
    level: levelSchema.optional(),
    gating: z.boolean().default(true),
    values: z
      .record(tokenNameSchema, stateValuesInputSchema)
      .default({})
      .meta({ description: 'Ground and ink must be in it, but on the base' }),
    message: messageSchema,
  })
  .meta({ id: 'PutTheme' })

export const patchThemeBody = z
  .strictObject({
    name: z.string().trim().min(1).max(120).optional(),
    from: slugSchema.optional(),
    ground: tokenNameSchema.optional(),
    ink: tokenNameSchema.optional(),
    rule: themeRuleSchema.optional(),
    level: z.union([levelSchema, z.null()]).optional(),
    gating: z.boolean().optional(),
    values: z
      .record(tokenNameSchema, z.union([stateValuesInputSchema, z.null()]))
      .optional()
      .meta({ description: 'Merged by token: a member replaces that token, null removes it' }),
    message: messageSchema,
  })
  .meta({ id: 'PatchTheme', description: 'Absent members stay' })

const themeExample = {
  id: 'thm_01jd5w7k2m',
  key: 'dark',
  name: 'Dark',
  position: 1,
  from: 'light',
  ground: 'surface.deck',
  ink: 'text.primary',
  rule: { kind: 'mirror', chroma: 0.92 },
  gating: true,
  values: {
    'surface.deck': {
      rest: { colorSpace: 'oklch', components: [0.19, 0.03, 255], alpha: 1 },
    },
  },
  etag: '"6e01"',
} as const

const writtenTheme = themeSchema.extend({ effect: effectSchema }).meta({ id: 'WrittenTheme' })
const themeParams = systemParams.extend({ theme: slugSchema.meta({ example: 'dark' }) })

export const listThemes = defineContract({
  operationId: 'listThemes',
  method: 'GET',
  path: '/v1/systems/{system}/themes',
  feature: 'themes',
  summary: 'The themes, the base first',
  params: systemParams,
  success: {
    status: 200,
    body: z.strictObject({ items: z.array(themeSchema) }),
    example: { items: [themeExample] },
  },
  problems: READ_PROBLEMS,
  access: 'themes:read',
  budget: 'theme-reads',
  conditional: true,
})

export const getTheme = defineContract({
  operationId: 'getTheme',
  method: 'GET',
  path: '/v1/systems/{system}/themes/{theme}',
  feature: 'themes',
  summary: 'One theme and the values it sets',
  params: themeParams,
  success: { status: 200, body: themeSchema, example: themeExample },
  problems: READ_PROBLEMS,
  access: 'themes:read',
  conditional: true,
})

export const putTheme = defineContract({
  operationId: 'putTheme',
  method: 'PUT',
  path: '/v1/systems/{system}/themes/{theme}',
  feature: 'themes',
  summary: 'Makes or replaces a theme; makes one revision',
  description:
    'The first theme of a system is its base and derives from none. Creation takes If-None-Match: * and answers 201, replacement If-Match and answers 200.',
  params: themeParams,
  body: putThemeBody,
  bodyExample: {
    name: 'Dark',
    ground: 'surface.deck',
    ink: 'text.primary',
    rule: { kind: 'mirror', chroma: 0.92 },
    gating: true,
    values: {
      'surface.deck': { rest: 'oklch(0.19 0.03 255)' },
      'text.primary': { rest: 'oklch(0.94 0.02 220)' },
    },
  },
  success: {
    status: 200,
    body: writtenTheme,
    example: { ...themeExample, effect: effectExample },
  },
  problems: [...EDIT_PROBLEMS, 'token-locked'],
  access: 'themes:write',
  precondition: 'create',
})

export const patchTheme = defineContract({
  operationId: 'patchTheme',
  method: 'PATCH',
  path: '/v1/systems/{system}/themes/{theme}',
  feature: 'themes',
  summary: 'Edits a theme; makes one revision',
  description: 'An accessibility lead edits level and gating only.',
  params: themeParams,
  body: patchThemeBody,
  bodyExample: { rule: { kind: 'mirror', chroma: 0.9 }, message: 'Calmer at night' },
  success: {
    status: 200,
    body: writtenTheme,
    example: { ...themeExample, effect: effectExample },
  },
  problems: [...EDIT_PROBLEMS, 'token-locked'],
  access: 'themes:write',
  precondition: 'required',
})

export const deleteTheme = defineContract({
  operationId: 'deleteTheme',
  method: 'DELETE',
  path: '/v1/systems/{system}/themes/{theme}',
  feature: 'themes',
  summary: 'Removes a theme that no other derives from; makes one revision',
  params: themeParams,
  query: z.strictObject({ message: messageSchema }),
  success: { status: 204 },
  problems: [...EDIT_PROBLEMS, 'theme-in-use', 'token-locked'],
  access: 'themes:write',
  precondition: 'required',
})

export const THEME_FORMATS = ['json', 'css'] as const

export const getThemeFile = defineContract({
  operationId: 'getThemeFile',
  method: 'GET',
  path: '/v1/systems/{system}/themes/{theme}.{format}',
  feature: 'themes',
  summary: 'A theme of the head revision, resolved, in one format',
  description:
    'json: Design Tokens 2025.10 at rest. css: custom properties for every state, hex, with mapped Display P3 where it differs.',
  params: themeParams.extend({
    format: z.enum(THEME_FORMATS).meta({ example: 'css' }),
  }),
  success: {
    status: 200,
    media: ['text/css; charset=utf-8', 'application/design-tokens+json'],
    body: z.string(),
    example: ':root {\n  --action-board-fill: #2283c1;\n}\n',
  },
  problems: [...READ_PROBLEMS, 'css-name-collision'],
  access: 'themes:read',
  budget: 'theme-reads',
  conditional: true,
})
