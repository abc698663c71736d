import { applyEdits, type SystemEdits } from '#shared/checks/edits.ts'
import type { Finding, PairModel, SystemModel } from '#shared/checks/model.ts'
import { weakeningsBetween } from '#shared/checks/weakening.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { pair, system, token } from './model-builder.ts'
import { evaluate, resolve } from './reading.ts'

/** `grey` on `ground` breaches as text (about 2.9 on light), `far` passes; `fill` and `label` have states. */
export const BASE = system({
  tokens: [
    token('grey', '#949494'),
    token('far', '#000000', { values: { dark: { rest: { kind: 'alias', token: 'ink' } } } }),
    token('fill', '#888888', { states: ['hover', 'disabled'] }),
    token('label', '#999999', { states: ['hover'] }),
    token('glass', 'rgb(0 0 0 / 0.4)'),
  ],
  pairs: [
    pair('grey', 'ground'),
    pair('label', 'fill', { id: 'label on fill', relation: 'inside' }),
  ],
})

const breaching = (model: SystemModel): Finding[] =>
  verdictOf(evaluate(model)).findings.filter(
    ({ outcome, gating }) => gating && outcome === 'breach',
  )

/** What an edit weakens, and how many breaches that gate it makes vanish. */
export function judge(before: SystemModel, edits: SystemEdits) {
  const after = applyEdits(before, edits)
  const found = weakeningsBetween(resolve(before), resolve(after))
  const left = new Set(breaching(after).map(({ identity }) => identity))
  const gone = breaching(before).filter(({ identity }) => !left.has(identity)).length
  return { found, gone, said: found.map(({ code, member }) => `${code} ${member ?? ''}`.trim()) }
}

export const withPair = (
  model: SystemModel,
  id: string,
  members: Partial<PairModel>,
): SystemEdits => {
  const before = model.pairs.find((one) => one.id === id)!
  return { pairs: { put: [{ ...before, ...members }] } }
}
export const without = <Item extends object>(item: Item, ...names: (keyof Item)[]): Item =>
  Object.fromEntries(
    Object.entries(item).filter(([name]) => !names.includes(name as keyof Item)),
  ) as Item

export const strictly = (members: Partial<PairModel>) =>
  system({
    tokens: [...BASE.tokens.slice(2), token('mid', '#5e5e5e')],
    pairs: [pair('mid', 'ground', { themes: ['light'], ...members })],
  })
export const MID = 'mid on ground'
