import * as z from 'zod'
import { DERIVED_STATES, LEVELS, STATES } from '#shared/checks/model.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { readDtcgColor } from '#shared/formats/dtcg-color.ts'

/** Slug of a system or a theme: no dot, so that a theme's file name splits at its first dot. */
export const slugSchema = z
  .string()
  .min(1)
  .max(63)
  .regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'Expected lower-case letters, digits and single hyphens')
  .meta({ description: 'Lower-case letters, digits and single hyphens', example: 'larkhaven' })

const NAME_PATTERN = /^(?![$])[^.{}\p{Cc}]+(\.(?:\$root|(?![$])[^.{}\p{Cc}]+))*$/u

/** Dot path of a token. @see Design Tokens Format Module 2025.10, Name and value */
export const tokenNameSchema = z
  .string()
  .min(1)
  .max(255)
  .regex(
    NAME_PATTERN,
    'Segments are non-empty, without { } or control characters, not starting with $',
  )
  .refine((name) => !/^state-(rest|hover|active|focus|disabled)(\.|$)/.test(name), {
    message: 'Names beginning with a state- group are reserved',
  })
  .meta({
    description: 'Dot path, at most 255 characters',
    example: 'action.board.fill',
    // Given by hand: the document has no place for a pattern's flags.
    pattern: NAME_PATTERN.source,
  })

export const aliasSchema = z
  .string()
  .regex(/^\{[^{}]{1,255}\}$/, 'Expected a token name in braces, such as {sand.1}')
  .meta({ description: 'A token name in braces', example: '{sand.1}' })

export const stateSchema = z.enum(STATES).meta({ id: 'State', example: 'hover' })
export const derivedStateSchema = z.enum(DERIVED_STATES).meta({ example: 'hover' })
export const levelSchema = z.enum(LEVELS).meta({ id: 'Level', example: 'AA' })
export const idSchema = z.string().min(1).max(64).meta({ example: 'tok_01jd5w7k2m' })
export const instantSchema = z.iso
  .datetime({ offset: false, precision: 3 })
  .meta({ description: 'RFC 3339, UTC', example: '2026-11-24T09:12:00.000Z' })
const NO_MOMENT = 'Expected a day or an instant of RFC 3339, such as 2026-11-24'
/** A moment in a query: a whole day stands for its beginning, UTC. */
export const momentSchema = z
  .union([z.iso.date(NO_MOMENT), z.iso.datetime({ offset: true, error: NO_MOMENT })])
  .transform((text) => new Date(text))
  .meta({
    type: 'string',
    description: 'RFC 3339: a day, UTC, or an instant',
    example: '2026-11-24',
  })
export const etagSchema = z
  .string()
  .meta({ description: 'Strong validator, as in the ETag field', example: '"9c3e1f20"' })
export const messageSchema = z
  .string()
  .trim()
  .max(500)
  .optional()
  .meta({ description: 'Why; stands on the revision', example: 'Lighter board button' })

const component = z.union([z.number(), z.enum(['none'])])

/** Spaces of the Design Tokens Color Module 2025.10. */
export const COLOR_SPACES = [
  'srgb',
  'srgb-linear',
  'hsl',
  'hwb',
  'lab',
  'lch',
  'oklab',
  'oklch',
  'display-p3',
  'a98-rgb',
  'prophoto-rgb',
  'rec2020',
  'xyz-d65',
  'xyz-d50',
] as const

export const dtcgColorSchema = z
  .strictObject({
    colorSpace: z.enum(COLOR_SPACES),
    components: z.array(component).length(3),
    alpha: z.number().min(0).max(1).optional(),
    hex: z
      .string()
      .regex(/^#[0-9a-fA-F]{6}$/, 'Expected # and six hexadecimal digits')
      .optional(),
  })
  .meta({
    id: 'Color',
    description: 'Colour value of the Design Tokens Color Module 2025.10',
    example: { colorSpace: 'oklch', components: [0.585, 0.128, 243], alpha: 1 },
  })

export const derivedValueSchema = z
  .strictObject({
    derive: aliasSchema,
    lightness: z.number().min(-1).max(1).optional(),
    chroma: z.number().min(0).max(10).optional(),
    hue: z.number().min(-360).max(360).optional(),
    alpha: z.number().min(0).max(1).optional(),
  })
  .meta({
    id: 'DerivedValue',
    description: 'Lightness and hue are added, chroma and alpha multiplied',
    example: { derive: '{action.board.fill}', lightness: 0.1, chroma: 0.5 },
  })

/** What an answer gives as a token's value. */
export const valueSchema = z
  .union([dtcgColorSchema, aliasSchema, derivedValueSchema])
  .meta({ id: 'Value' })
export type ValueWire = z.infer<typeof valueSchema>

/** A colour object as a write gives it: each component within the range of its space, whatever else is wrong. */
const colorInputSchema = dtcgColorSchema
  .superRefine(
    (value, context) => {
      const read = readDtcgColor(value)
      if (read.ok) return
      for (const { code, pointer, detail } of read.faults) {
        if (code !== 'color-range') continue
        const path = pointer.slice(1).split('/')
        context.addIssue({ code: 'custom', path, message: detail })
      }
    },
    { when: () => true },
  )
  .meta({ id: 'ColorInput', description: 'Each component lies in the range of its space' })

/** A colour by itself, that names no token: any CSS Color 4 string, or a colour object. */
export const colorValueSchema = z
  .union([
    z
      .string()
      .trim()
      .min(1, { abort: true })
      .max(255, { abort: true })
      .superRefine((text, context) => {
        const read = parseColor(text)
        if (!read.ok) context.addIssue({ code: 'custom', message: read.reason })
      }),
    colorInputSchema,
  ])
  .meta({
    id: 'ColorValue',
    description: 'A CSS Color 4 string or a colour object',
    example: 'oklch(0.585 0.128 243)',
  })
export type ColorValue = z.infer<typeof colorValueSchema>

const isBraced = (text: string): boolean => text.startsWith('{') && text.endsWith('}')

/** A CSS colour, or a name in braces: whether there is a token of that name is not for a contract to say. */
const textInputSchema = z
  .string()
  .trim()
  .min(1, { abort: true })
  .max(255, { abort: true })
  .superRefine((text, context) => {
    const read = isBraced(text) ? undefined : parseColor(text)
    if (read?.ok === false) context.addIssue({ code: 'custom', message: read.reason })
  })

/** What a write takes: also any CSS Color 4 string. */
export const valueInputSchema = z
  .union([textInputSchema, colorInputSchema, derivedValueSchema])
  .meta({
    id: 'ValueInput',
    description: 'A CSS Color 4 string, a colour object, a token name in braces, or a derivation',
    example: 'oklch(0.585 0.128 243)',
  })
export type ValueInput = z.infer<typeof valueInputSchema>

const perState = <S extends z.ZodType>(schema: S) =>
  z.strictObject({
    rest: schema.optional(),
    hover: schema.optional(),
    active: schema.optional(),
    focus: schema.optional(),
    disabled: schema.optional(),
  })

export const stateValuesSchema = perState(valueSchema).meta({ id: 'StateValues' })
export const stateValuesInputSchema = perState(valueInputSchema).meta({ id: 'StateValuesInput' })

/** Values by theme key, then by state. */
export const themeValuesSchema = z.record(slugSchema, stateValuesSchema)
export const themeValuesInputSchema = z.record(slugSchema, stateValuesInputSchema)

const WHOLE_NUMBER = /^(?:0|-?[1-9]\d*)$/

/** A whole number in a path or a query: decimal digits alone, not what else `Number` takes (0x10, 1e2, spaces). */
export const wholeNumberSchema = (least: number, most: number) =>
  z.preprocess((given, context) => {
    if (typeof given !== 'string') return given
    if (WHOLE_NUMBER.test(given)) return Number(given)
    context.addIssue({ code: 'invalid_type', expected: 'int', input: given })
    return z.NEVER
  }, z.int().min(least).max(most))

const countSchema = (most: number) => wholeNumberSchema(1, most)

export const limitSchema = (most: number, fallback: number) =>
  countSchema(most)
    .default(fallback)
    .meta({ type: 'integer', minimum: 1, maximum: most, default: fallback })
/** For a list of which one view answers everything at once: the operation says what absence means. */
export const openLimitSchema = (most: number, description: string) =>
  countSchema(most).optional().meta({ type: 'integer', minimum: 1, maximum: most, description })
export const cursorSchema = z
  .string()
  .max(512)
  .optional()
  .meta({ description: 'From the rel="next" link of the page before' })

export const systemParams = z.object({ system: slugSchema })

export const personSchema = z
  .strictObject({ id: idSchema, name: z.string() })
  .meta({ id: 'Person', example: { id: 'usr_01jd5w7k2m', name: 'Ines Marrow' } })
