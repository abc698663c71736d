import { createDocument } from '#openapi/document.ts'
import { SOUND_COLORS, SOUND_NAMES } from './hostile-values.ts'
import type { Random } from './random.ts'

interface Schema {
  readonly $ref?: string
  readonly type?: string | readonly string[]
  readonly enum?: readonly unknown[]
  readonly anyOf?: readonly Schema[]
  readonly properties?: Readonly<Record<string, Schema>>
  readonly required?: readonly string[]
  readonly additionalProperties?: boolean | Schema
  readonly items?: Schema
  readonly minItems?: number
  readonly minimum?: number
  readonly maximum?: number
  readonly example?: unknown
}
interface Operation {
  readonly operationId: string
  readonly requestBody?: { readonly content: Readonly<Record<string, { readonly schema: Schema }>> }
}

const document = JSON.parse(JSON.stringify(createDocument())) as {
  readonly paths: Readonly<Record<string, Readonly<Record<string, Operation>>>>
  readonly components: { readonly schemas: Readonly<Record<string, Schema>> }
}

/** The schema of each operation's JSON body, by operation. */
const bodySchemas = new Map(
  Object.values(document.paths)
    .flatMap((methods) => Object.values(methods))
    .map((one) => [one.operationId, one.requestBody?.content['application/json']?.schema]),
)

/** Answers a body that the document mostly allows, in words of the system that is attacked. */
export function sampleBody(operationId: string, random: Random): unknown {
  return sample(bodySchemas.get(operationId) ?? {}, random, { name: '', depth: 0 })
}

interface At {
  readonly name: string
  readonly depth: number
}

function sample(schema: Schema, random: Random, { name, depth }: At): unknown {
  const below = (part: Schema, as = name) => sample(part, random, { name: as, depth: depth + 1 })
  const { $ref, anyOf, type, minimum = -2, maximum = 5 } = schema
  if ($ref !== undefined)
    return below(document.components.schemas[$ref.split('/').at(-1) ?? ''] ?? {})
  if (schema.enum !== undefined) return random.pick(schema.enum)
  if (anyOf !== undefined) return below(random.pick(anyOf))
  switch (Array.isArray(type) ? random.pick(type) : type) {
    case 'object':
      return sampleObject(schema, random, depth)
    case 'array':
      return Array.from({ length: (schema.minItems ?? 0) + random.below(3) }, () =>
        depth > 8 ? null : below(schema.items ?? {}),
      )
    case 'number':
      return minimum + (Math.min(maximum, 1e6) - minimum) * random.pick([0, 1, random.next()])
    case 'integer':
      return random.pick([minimum, Math.min(maximum, 1e6), 1])
    case 'boolean':
      return random.chance(0.5)
    case 'null':
      return null
    default:
      return sampleText(schema, random, name)
  }
}

function sampleObject(schema: Schema, random: Random, depth: number): unknown {
  const { properties = {}, required = [], additionalProperties: others } = schema
  const known = Object.entries(properties).filter(
    ([name]) => required.includes(name) || (depth < 7 && random.chance(0.4)),
  )
  const named = [...SOUND_NAMES, 'light', 'dark', 'rest', 'hover']
  const free =
    typeof others === 'object' && depth < 7
      ? Array.from({ length: random.below(3) }, () => [random.pick(named), others] as const)
      : []
  return Object.fromEntries(
    [...known, ...free].map(([name, part]) => [
      name,
      sample(part, random, { name, depth: depth + 1 }),
    ]),
  )
}

const NAMES_TOKEN = /^(name|foreground|background|ground|ink|tokens?|backdrop|replacement|prefix)$/
const HOLDS_COLOR = /^(value|color|first|second|seed|rest|hover|active|focus|disabled)$/

function sampleText({ example }: Schema, random: Random, name: string): unknown {
  if (name === 'name' && random.chance(0.6)) return `made.${random.below(10_000)}`
  if (NAMES_TOKEN.test(name)) return random.pick(SOUND_NAMES)
  if (HOLDS_COLOR.test(name)) return random.pick(SOUND_COLORS)
  return example ?? random.pick(['light', 'dark', 'AA', 'Crew’s 💧', '2027-01-01'])
}
