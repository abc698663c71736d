import type { Oklch } from '#shared/color/oklch.ts'
import { type DtcgColor, writeDtcgColor } from './dtcg-color.ts'
import { type JsonObject, objectOf } from './dtcg-fault.ts'
import { mergedDocument } from './dtcg-merge.ts'
import { literalDigest } from './literal-digest.ts'

/** Under which a file says what the format has no words for. */
export const EXTENSION = 'dev.dyewright'

/** The modifiers of a file of ours, and its set. */
export const [CORE, THEME, STATE] = ['core', 'theme', 'state']

/** The group of a set that holds the colours of one state. */
export const stateGroup = (state: string): string => `state-${state}`

/** One colour of a token in a theme and state, and the rule it follows from where it is not set by hand. */
export interface ResolverColor {
  readonly color: Oklch
  readonly rule?: string
}

/** A token as a resolver file holds it. */
export interface ResolverToken {
  /** Dot path. */
  readonly name: string
  readonly description?: string
  readonly deprecated?: boolean | string
  /** Name of the token that its source refers to. */
  readonly alias?: string
  /** By theme, the base first, and state, `rest` among them. */
  readonly colors: readonly { readonly [state: string]: ResolverColor }[]
  /** By theme: the alias gives that theme's rest too. */
  readonly follows: readonly boolean[]
  /** What the system says of it beyond the format; `value` where what is written only follows from that. */
  readonly extension: JsonObject
  /** Members that came with it and are not read, verbatim. */
  readonly besides?: JsonObject
}

/** Members that are not ours, verbatim: of the file itself, of its set and of its modifiers. */
export interface ResolverBesides {
  readonly root?: JsonObject
  readonly core?: JsonObject
  readonly theme?: JsonObject
  readonly state?: JsonObject
}

/** A system as a resolver file holds it. */
export interface SystemResolver {
  /** Keys, the base first; none where there is no theme yet. */
  readonly themes: readonly string[]
  /** States besides rest that any token takes part in. */
  readonly states: readonly string[]
  readonly tokens: readonly ResolverToken[]
  readonly extension: JsonObject
  /** A document of what is no colour. */
  readonly remainder?: JsonObject
  /** What belongs to a modifier that the file lacks is left out. */
  readonly besides?: ResolverBesides
}

type Tree = Record<string, unknown>

/**
 * Writes a system as one resolver file: set `core` holds sources and aliases of the base, modifier `theme` the
 * literals that differ, modifier `state` refers each token to its colour of that state. Each literal that is no
 * source carries a digest, and the rule it follows from.
 * @see https://www.designtokens.org/tr/2025.10/resolver/
 */
export function systemResolver(system: SystemResolver): JsonObject {
  const { themes, states, tokens, remainder = {}, besides = {}, extension } = system
  const core = mergedDocument([remainder, treeOf(tokens.flatMap(coreEntries))])
  const [base = '', ...others] = themes
  const contexts = [base, ...others].map((key, at) => {
    const tree = at === 0 ? {} : treeOf(tokens.flatMap((token) => themeEntries(token, at)))
    return [key, Object.keys(tree).length === 0 ? [] : [tree]]
  })
  const stateContexts = states.map((state) => [state, [treeOf(stateEntries(tokens, state))]])
  const modifiers = {
    ...(themes.length > 1
      ? { [THEME]: { ...besides.theme, default: base, contexts: Object.fromEntries(contexts) } }
      : {}),
    ...(states.length > 0
      ? {
          [STATE]: {
            ...besides.state,
            default: 'rest',
            contexts: Object.fromEntries([['rest', []], ...stateContexts]),
          },
        }
      : {}),
  }
  return {
    ...besides.root,
    version: '2025.10',
    sets: { [CORE]: { ...besides.core, sources: [core] } },
    ...(Object.keys(modifiers).length > 0 ? { modifiers } : {}),
    resolutionOrder: [
      { $ref: `#/sets/${CORE}` },
      ...Object.keys(modifiers).map((name) => ({ $ref: `#/modifiers/${name}` })),
    ],
    $extensions: { ...objectOf(besides.root?.$extensions), [EXTENSION]: extension },
  }
}

type Entry = readonly [name: string, token: JsonObject]

function coreEntries(token: ResolverToken): Entry[] {
  const [base = {}] = token.colors
  const { rest, ...states } = base
  return [
    [token.name, coreToken(token, rest)],
    ...Object.entries(states).map(
      ([state, color]): Entry => [`${stateGroup(state)}.${token.name}`, literal(color)],
    ),
  ]
}

function coreToken(token: ResolverToken, rest: ResolverColor | undefined): JsonObject {
  const { alias, description, deprecated, extension, besides = {} } = token
  const { $value: spelt, $extensions, ...members } = besides
  const value = alias === undefined ? (spelt ?? (rest && written(rest.color))) : `{${alias}}`
  const isDerived = extension.value !== undefined
  return {
    ...members,
    $type: 'color',
    $value: value,
    ...(description === undefined ? {} : { $description: description }),
    ...(deprecated === undefined ? {} : { $deprecated: deprecated }),
    $extensions: {
      ...objectOf($extensions),
      [EXTENSION]: {
        ...extension,
        ...(isDerived ? { rule: rest?.rule, digest: literalDigest(value) } : {}),
      },
    },
  }
}

/** What a theme has that the set and its aliases would not give it. */
function themeEntries({ name, colors, alias, follows }: ResolverToken, at: number): Entry[] {
  const base = colors[0] ?? {}
  return Object.entries(colors[at] ?? {}).flatMap(([state, color]): Entry[] => {
    const isGiven =
      state === 'rest' && alias !== undefined
        ? follows[at] === true
        : isSame(color.color, base[state]?.color)
    const path = state === 'rest' ? name : `${stateGroup(state)}.${name}`
    return isGiven ? [] : [[path, literal(color)]]
  })
}

function stateEntries(tokens: readonly ResolverToken[], state: string): Entry[] {
  return tokens
    .filter(({ colors }) => colors[0]?.[state] !== undefined)
    .map(({ name }) => [name, { $type: 'color', $value: `{${stateGroup(state)}.${name}}` }])
}

function literal({ color, rule }: ResolverColor): JsonObject {
  const value = written(color)
  const said = { ...(rule === undefined ? {} : { rule }), digest: literalDigest(value) }
  return { $type: 'color', $value: value, $extensions: { [EXTENSION]: said } }
}

const TURN = 360

/** Hues are counted in one turn; a source is in it already. */
function written(color: Oklch): DtcgColor {
  const { h } = color
  if (h === null || (h >= 0 && h < TURN)) return writeDtcgColor(color)
  return writeDtcgColor({ ...color, h: ((h % TURN) + TURN) % TURN })
}

const isSame = (a: Oklch, b: Oklch | undefined): boolean =>
  b !== undefined && a.l === b.l && a.c === b.c && a.h === b.h && a.alpha === b.alpha

/** Without prototypes: a token may be called anything. */
function treeOf(entries: readonly Entry[]): Tree {
  const root = emptyGroup()
  const groups = new Map<string, Tree>([['', root]])
  for (const [name, token] of entries) {
    const cut = name.lastIndexOf('.')
    groupAt(name.slice(0, Math.max(0, cut)), groups)[name.slice(cut + 1)] = token
  }
  return root
}

function groupAt(path: string, groups: Map<string, Tree>): Tree {
  const known = groups.get(path)
  if (known) return known
  const cut = path.lastIndexOf('.')
  const parent = groupAt(path.slice(0, Math.max(0, cut)), groups)
  const group = emptyGroup()
  parent[path.slice(cut + 1)] = group
  groups.set(path, group)
  return group
}

const emptyGroup = () => Object.create(null) as Tree
