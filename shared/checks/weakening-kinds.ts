import type { Level, PairModel } from './model.ts'
import type { ResolvedSystem } from './resolved.ts'

/** The ways in which an edit can ask for less than before, or make a breach vanish without mending a colour. */
export const WEAKENINGS = [
  'level-lowered',
  'minimum-lowered',
  'floor-lowered',
  'use-asks-less',
  'p3-switched-off',
  'gating-stopped',
  'theme-removed',
  'ground-moved',
  'pair-removed',
  'pair-narrowed',
  'pair-moved',
  'taken-together',
  'states-changed',
  'exempted',
  'any-of-joined',
  'import-replaces',
] as const
/** One of the ways. */
export type WeakeningCode = (typeof WEAKENINGS)[number]

/** One thing that an edit weakens. */
export interface Weakening {
  readonly code: WeakeningCode
  readonly item:
    | { readonly kind: 'system' }
    | { readonly kind: 'theme' | 'pair' | 'token'; readonly id: string }
  /** The member of the item that does it, as the API calls it; absent where the item goes as a whole. */
  readonly member?: string
  /** One sentence with names, without its full stop. */
  readonly detail: string
}

/** Whether a level is asked for no longer. */
export const isLevelLowered = (before: Level | undefined, after: Level | undefined): boolean =>
  before === 'AAA' && after !== 'AAA'

/** What a pair is called in a sentence: `text.muted on surface.deck`. */
export function createPairTitles(
  ...systems: readonly ResolvedSystem[]
): (pair: Pick<PairModel, 'foreground' | 'background'>) => string {
  const nameOf = createTokenNames(...systems)
  return ({ foreground, background }) => `${nameOf(foreground)} on ${nameOf(background)}`
}

/** What a token is called in the first of some systems that has it. */
export function createTokenNames(...systems: readonly ResolvedSystem[]): (id: string) => string {
  return (id) =>
    systems.map(({ tokens }) => tokens.get(id)?.token.name).find((name) => name !== undefined) ?? id
}
