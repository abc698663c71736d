import type { WholeSystem } from '#shared/contracts/system-model.ts'
import type { DemoPair, PairName, Step } from './step.ts'

type Mutable<T> = { -readonly [K in keyof T]: T[K] }
type Token = Mutable<WholeSystem['tokens'][number]>
type Pair = Mutable<WholeSystem['pairs'][number]>

const SETTINGS: WholeSystem['system'] = {
  level: 'AA',
  p3: true,
  p3Gates: true,
  disabledFloor: null,
}

/** What tells one declared pair of the demo from another. */
export function pairKey({ foreground, background, use, product }: PairName): string {
  return [foreground, background, use, product ?? ''].join(' ')
}

const withoutMessage = <B extends { readonly message?: unknown }>({ message: _, ...body }: B) =>
  body

const newPair = (body: DemoPair & { readonly message: string }): Pair => ({
  relation: 'inside',
  ...withoutMessage(body),
  id: pairKey(body),
})

/**
 * The system as the service holds it after some steps, worked out in memory: tokens, themes and pairs
 * bear their names as ids.
 */
export function wholeAfter(steps: readonly Step[]): WholeSystem {
  const tokens = new Map<string, Token>()
  const themes: WholeSystem['themes'][number][] = []
  const pairs = new Map<string, Pair>()
  let rules: WholeSystem['rules'] = { states: {}, prefixes: [] }
  const take = {
    'create-token': ({ body }: Extract<Step, { kind: 'create-token' }>) => {
      const { name } = body
      tokens.set(name, { states: [], values: {}, locked: false, ...withoutMessage(body), id: name })
    },
    'patch-token': ({ name, body }: Extract<Step, { kind: 'patch-token' }>) => {
      // The demo removes no member, so none of the body's is null.
      Object.assign(tokenNamed(name), withoutMessage(body))
    },
    'put-theme': ({ theme }: Extract<Step, { kind: 'put-theme' }>) => {
      const { key, values = {}, message: _, ...body } = theme
      const base = themes[0]?.key
      themes.push({
        rule: { kind: 'keep' },
        gating: true,
        ...(base === undefined ? {} : { from: base }),
        ...body,
        id: key,
        key,
        position: themes.length,
      })
      for (const [name, byState] of Object.entries(values)) {
        const token = tokenNamed(name)
        token.values = { ...token.values, [key]: byState }
      }
    },
    'put-rules': ({ body }: Extract<Step, { kind: 'put-rules' }>) => {
      rules = withoutMessage(body)
    },
    'create-pair': ({ body }: Extract<Step, { kind: 'create-pair' }>) => {
      pairs.set(pairKey(body), newPair(body))
    },
    // A distinct set gates nothing: no part of what the demo is measured by.
    'create-distinct-set': () => {},
    'patch-pair': ({ pair, body }: Extract<Step, { kind: 'patch-pair' }>) => {
      const declared = pairs.get(pairKey(pair))
      if (!declared) throw new TypeError(`The demo declares no pair ${pairKey(pair)}`)
      Object.assign(declared, withoutMessage(body))
    },
  }
  const tokenNamed = (name: string): Token => {
    const token = tokens.get(name)
    if (!token) throw new TypeError(`The demo has no token ${name}`)
    return token
  }
  for (const step of steps) (take[step.kind] as (one: Step) => void)(step)
  return {
    system: SETTINGS,
    tokens: [...tokens.values()],
    pairs: [...pairs.values()],
    themes,
    rules,
  }
}
