import {
  type DtcgFault,
  fault,
  type JsonObject,
  objectOf,
  quoted,
  pointerTo,
} from './dtcg-fault.ts'
import {
  readResolverShape,
  type ResolverModifier,
  type ResolverShape,
  type ResolverSource,
} from './dtcg-resolver-shape.ts'
import { mergedDocument } from './dtcg-merge.ts'

/** What is chosen for each modifier, by its name. */
export type ResolverInput = { readonly [modifier: string]: string }

/** One choice of contexts and the token document it gives. */
export interface ResolverPermutation {
  readonly input: ResolverInput
  /** Flattened, aliases not yet resolved: read it with `readDtcgTokens`. */
  readonly document: JsonObject
}

/** A resolver file whose every part is sound. */
export interface DtcgResolver {
  /** In the order in which they apply. */
  readonly modifiers: readonly {
    readonly name: string
    readonly contexts: readonly string[]
    readonly default?: string
  }[]
  /** What the sets and modifiers of the order say of themselves, in that order. */
  readonly steps: readonly {
    readonly kind: 'set' | 'modifier'
    readonly name: string
    /** Members that give no tokens, verbatim; those beside a `$ref` in place of those it refers to. */
    readonly besides: JsonObject
  }[]
  /** How many choices there are: the product of the context counts. */
  readonly permutationCount: number
  /** The document of one choice; modifiers left out take their default. */
  readonly documentFor: (input: unknown) => DocumentReading
  /** Every choice in turn, contexts in the order of the file. */
  readonly permutations: () => ResolverPermutation[]
}

/** A resolver, or every fault of its file. */
export type ResolverReading =
  | { readonly ok: true; readonly resolver: DtcgResolver }
  | { readonly ok: false; readonly faults: readonly DtcgFault[] }

/** The document of one choice, or every fault of the choice. */
export type DocumentReading =
  | { readonly ok: true; readonly document: JsonObject }
  /** Pointers lead into the input. */
  | { readonly ok: false; readonly faults: readonly DtcgFault[] }

const MOST_PERMUTATIONS = 256

/**
 * Reads a resolver file: sets and modifiers, flattened in resolution order into one token document a choice.
 * @param file Anything JSON can hold.
 * @returns The resolver; or every fault at once, each with a pointer from the file. More than 256 choices are refused.
 * @see https://www.designtokens.org/tr/2025.10/resolver/
 */
export function readDtcgResolver(file: unknown): ResolverReading {
  const root = objectOf(file)
  if (!root) {
    const faults = [fault('document-shape', '', 'A resolver file is a JSON object.')]
    return { ok: false, faults }
  }
  const shape = readResolverShape(root)
  if (shape.faults.length > 0) return { ok: false, faults: shape.faults }
  const modifiers = shape.order.flatMap((step) => (step.kind === 'modifier' ? step.modifier : []))
  const permutationCount = modifiers.reduce((count, { contexts }) => count * contexts.size, 1)
  if (permutationCount > MOST_PERMUTATIONS) {
    const detail = `Its contexts give ${permutationCount} choices; ${MOST_PERMUTATIONS} at most.`
    return { ok: false, faults: [fault('too-many-contexts', '/modifiers', detail)] }
  }
  return { ok: true, resolver: createResolver(shape, modifiers, permutationCount) }
}

function createResolver(
  shape: ResolverShape,
  modifiers: readonly ResolverModifier[],
  permutationCount: number,
): DtcgResolver {
  return {
    modifiers: modifiers.map(({ name, contexts, default: chosen }) => ({
      name,
      contexts: [...contexts.keys()],
      ...(chosen === undefined ? {} : { default: chosen }),
    })),
    steps: shape.order.map((step) => ({
      kind: step.kind,
      name: step.kind === 'set' ? step.name : step.modifier.name,
      besides: step.besides,
    })),
    permutationCount,
    documentFor: (input) => {
      const { chosen, faults } = chosenContexts(input, modifiers)
      return faults.length > 0
        ? { ok: false, faults }
        : { ok: true, document: flattened(shape, chosen) }
    },
    permutations: () =>
      choices(modifiers).map((input) => ({ input, document: flattened(shape, input) })),
  }
}

function chosenContexts(input: unknown, modifiers: readonly ResolverModifier[]) {
  const faults: DtcgFault[] = []
  const given = objectOf(input)
  if (!given) faults.push(fault('input-not-string', '', 'An input is an object of context names.'))
  const chosen = new Map<string, string>()
  const known = new Map(modifiers.map((modifier) => [modifier.name, modifier]))
  for (const [name, context] of Object.entries(given ?? {})) {
    const modifier = known.get(name)
    const pointer = pointerTo('', name)
    if (!modifier) {
      faults.push(fault('input-unknown-modifier', pointer, `There is no modifier ${quoted(name)}.`))
    } else if (typeof context !== 'string') {
      faults.push(fault('input-not-string', pointer, 'A context is named by text.'))
    } else {
      const match = contextNamed(modifier, context)
      if (match !== undefined) chosen.set(name, match)
      else faults.push(fault('input-context', pointer, `There is no context ${quoted(context)}.`))
    }
  }
  for (const { name, default: fallback } of modifiers) {
    if (Object.hasOwn(given ?? {}, name)) continue
    if (fallback !== undefined) chosen.set(name, fallback)
    else
      faults.push(fault('input-missing', '', `${quoted(name)} has no default: choose a context.`))
  }
  return { chosen: Object.fromEntries(chosen), faults }
}

/** The exact name first; else the one that differs in case alone, as the specification recommends. */
function contextNamed({ contexts }: ResolverModifier, name: string): string | undefined {
  if (contexts.has(name)) return name
  const alike = [...contexts.keys()].filter((each) => each.toLowerCase() === name.toLowerCase())
  return alike.length === 1 ? alike[0] : undefined
}

function choices(modifiers: readonly ResolverModifier[]): ResolverInput[] {
  return modifiers.reduce<ResolverInput[]>(
    (inputs, { name, contexts }) =>
      inputs.flatMap((input) =>
        [...contexts.keys()].map((context) => ({ ...input, [name]: context })),
      ),
    [{}],
  )
}

function flattened({ sets, order }: ResolverShape, input: ResolverInput): JsonObject {
  const sources = order.flatMap((step) =>
    step.kind === 'set' ? step.sources : step.modifier.contexts.get(input[step.modifier.name]!)!,
  )
  return mergedDocument(tokensOf(sources, sets))
}

/**
 * Replaces each set by its sources; sets are known to be free of cycles.
 * A set that comes again later overrides all that it gave before, so only its last place counts.
 */
function tokensOf(
  sources: readonly ResolverSource[],
  sets: ReadonlyMap<string, readonly ResolverSource[]>,
): JsonObject[] {
  const lastFirst: JsonObject[] = []
  const seen = new Set<string>()
  const waiting = [...sources]
  for (let source = waiting.pop(); source; source = waiting.pop()) {
    if (source.kind === 'tokens') lastFirst.push(source.tokens)
    else if (!seen.has(source.name)) {
      seen.add(source.name)
      for (const inner of sets.get(source.name)!) waiting.push(inner)
    }
  }
  return lastFirst.reverse()
}
