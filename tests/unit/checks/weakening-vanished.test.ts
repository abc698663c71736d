import fc from 'fast-check'
import { expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { applyEdits, type SystemEdits } from '#shared/checks/edits.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import {
  DERIVED_STATES,
  type Finding,
  type PairModel,
  type SystemModel,
} from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { weakeningsBetween } from '#shared/checks/weakening.ts'
import { Dice, randomPair, randomSystem } from './random-system.ts'

/** Edits that touch what is asked, not what is shown: pairs member by member, states, settings, themes. */
function randomAsk(dice: Dice, model: SystemModel): SystemEdits {
  const ids = model.tokens.map(({ id }) => id)
  const kind = dice.pick(['member', 'member', 'member', 'states', 'settings', 'theme', 'pairs'])
  if (kind === 'member') {
    const before = dice.pick(model.pairs)
    const drawn = randomPair(dice, ids, before.id)
    const name = dice.pick([...Object.keys(drawn), ...Object.keys(before)]) as keyof PairModel
    const { [name]: _, ...rest } = before
    return {
      pairs: { put: [{ ...rest, ...(name in drawn ? { [name]: drawn[name] } : {}) } as PairModel] },
    }
  }
  if (kind === 'states') {
    const before = dice.pick(model.tokens)
    return { tokens: { put: [{ ...before, states: dice.some(DERIVED_STATES, 0.5) }] } }
  }
  if (kind === 'settings') return { settings: randomSystem(dice, 2).settings }
  if (kind === 'theme') {
    const at = dice.upTo(model.themes.length)
    const members = {
      gating: dice.chance(0.5),
      ...dice.maybe(0.4, () => ({ level: 'AAA' as const })),
    }
    return {
      themes: model.themes.map(({ level, ...one }, place) =>
        place === at ? { ...one, ...members } : { ...one, ...(level ? { level } : {}) },
      ),
    }
  }
  const id = dice.chance(0.5) ? dice.pick(model.pairs).id : 'new'
  const pairs = dice.chance(0.3) ? { remove: [id] } : { put: [randomPair(dice, ids, id)] }
  return { pairs }
}

const evaluationOf = (model: SystemModel): Evaluation | undefined => {
  const checked = checkSystem(model)
  return checked.ok ? checked.evaluation : undefined
}

const colorsOf = ({ resolved }: Evaluation) =>
  JSON.stringify(
    [...resolved.tokens].map(([id, { cells }]) => [id, cells.map(({ color }) => color)]),
  )

const stateOf = ({ foregroundState, backgroundState }: Finding) => [
  foregroundState,
  backgroundState,
]

/** Whether a later finding of the same pair and theme still asks what a breach asked, though it is met. */
function isAskedStill(breach: Finding, later: readonly Finding[], relation: PairModel['relation']) {
  const [foreground, background] = stateOf(breach)
  const component = foreground === 'rest' ? background : foreground
  return later.some((finding) => {
    const isSameState = stateOf(finding).join() === stateOf(breach).join()
    const isSameComponent = relation === 'together' && stateOf(finding).includes(component!)
    const isUnderPointer = component !== 'disabled' && foreground !== 'rest'
    const stays =
      isSameState || isSameComponent || (isUnderPointer && finding.foregroundState === foreground)
    if (!stays || finding.theme !== breach.theme || !finding.gating) return false
    if (finding.outcome === 'breach') return true
    return !isSameState && finding.outcome === 'pass' && finding.reason !== 'any-of'
  })
}

it('leaves every breach that gates where nothing is weakened and no colour moves', {
  timeout: 60_000,
}, () => {
  const tally = { judged: 0, unweakened: 0, weakened: 0 }
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      const dice = new Dice(seed)
      const model = randomSystem(dice)
      const before = evaluationOf(model)
      if (before === undefined) return
      const breaches = verdictOf(before).findings.filter(
        ({ outcome, gating }) => gating && outcome === 'breach',
      )
      for (let step = 0; step < 12; step++) {
        const edited = applyEdits(model, randomAsk(dice, model))
        const after = evaluationOf(edited)
        if (after === undefined || colorsOf(after) !== colorsOf(before)) continue
        tally.judged++
        const weakened = weakeningsBetween(before.resolved, after.resolved)
        if (weakened.length > 0) {
          tally.weakened++
          continue
        }
        tally.unweakened++
        const findings = verdictOf(after).findings
        for (const breach of breaches) {
          const isAsked = breach.pairs.some((id) => {
            const later = findings.filter(({ pairs }) => pairs.includes(id))
            const relation = edited.pairs.find((one) => one.id === id)?.relation ?? 'inside'
            return isAskedStill(breach, later, relation)
          })
          if (!isAsked) expect(breach).toBeNull()
        }
      }
    }),
    { numRuns: 40 },
  )
  // Neither side may be empty, or nothing was tried.
  expect(tally.unweakened).toBeGreaterThan(25)
  expect(tally.weakened).toBeGreaterThan(25)
})
