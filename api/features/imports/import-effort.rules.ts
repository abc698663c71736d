import type { GovernedSystem } from '#shared/checks/governed-model.ts'
import { isToken } from '#shared/formats/dtcg-document.ts'
import { type JsonObject, objectOf } from '#shared/formats/dtcg-fault.ts'
import { EXTENSION } from '#shared/formats/system-resolver.ts'
import { propertiesIn } from './read-style-sheet.rules.ts'

/**
 * Work is told by counts, before any of it is done: a token costs as much to read, compare and store as some ten
 * colours to derive and render. So much takes about five seconds of one core.
 */
const COLORS_A_TOKEN = 10
const MOST_AT_ONCE = 200_000

/** Tokens, colour or not, that a document has at most. */
export const MOST_TOKENS = 20_000

/** Whether an import would keep its caller waiting; what is refused anyway does not. */
export function isLong(file: JsonObject | string, model: GovernedSystem): boolean {
  const given = tokensIn(file)
  return !hasTooMany(file, given) && importEffort(given * readings(file), model) > MOST_AT_ONCE
}

/** The contexts of a resolver file of another making are read one by one, each with all that they share. */
function readings(file: JsonObject | string): number {
  if (typeof file === 'string' || !isResolver(file)) return 1
  if (objectOf(objectOf(file.$extensions)?.[EXTENSION])?.engine !== undefined) return 1
  const modifiers = Object.values(objectOf(file.modifiers) ?? {})
  const contexts = modifiers.map(
    (modifier) => Object.keys(objectOf(objectOf(modifier)?.contexts) ?? {}).length,
  )
  return Math.max(1, ...contexts)
}

/** A resolver file holds one document a choice, so its tokens are counted in each. */
export const hasTooMany = (file: JsonObject | string, given = tokensIn(file)): boolean =>
  given > MOST_TOKENS && (typeof file === 'string' || !isResolver(file))

export const isResolver = (file: JsonObject): boolean => Object.hasOwn(file, 'resolutionOrder')

/**
 * The work of an import in colours: each token of the file is read, and in the end each token is in each theme
 * and state.
 * @param given tokens of the file
 */
export function importEffort(given: number, { tokens, themes, pairs }: GovernedSystem): number {
  const states = tokens.reduce((sum, token) => sum + 1 + token.states.length, 0)
  const colors = (states + given) * Math.max(1, themes.length)
  return COLORS_A_TOKEN * given + colors + pairs.length
}

/** How many tokens a document has, or the documents of a resolver file together; nothing is checked. */
export function tokensIn(file: JsonObject | string): number {
  if (typeof file === 'string') return propertiesIn(file)
  let count = 0
  const waiting: unknown[] = [file]
  for (let value = waiting.pop(); value !== undefined; value = waiting.pop()) {
    const node = objectOf(value)
    if (node && isToken(node)) count += 1
    else if (typeof value === 'object' && value !== null) {
      for (const [name, member] of Object.entries(value)) {
        const isWithin = !name.startsWith('$') || name === '$root'
        if (isWithin && typeof member === 'object' && member !== null) waiting.push(member)
      }
    }
  }
  return count
}
