import { checkSystem } from '#shared/checks/check-system.ts'
import { consequences } from '#shared/checks/consequences.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { FOCUS, seeded, systemOf } from './scenario.ts'

/** Runs in the page. @returns milliseconds for each of the chips: a colour tried, and all that it moves */
export function tryChips(chips: number): number[] {
  const checked = checkSystem(systemOf({ tokens: 2_000, pairs: 5_000 }))
  if (!checked.ok) throw new TypeError(checked.faults[0]?.detail)
  const { evaluation } = checked
  const focus = evaluation.resolved.model.tokens.find(({ id }) => id === FOCUS)!
  const random = seeded(5)
  return Array.from({ length: chips }, () => {
    const color = { l: random(), c: random() * 0.1, h: random() * 360, alpha: 1 }
    const from = performance.now()
    const put = [{ ...focus, value: { kind: 'color', color } as const }]
    const after = recheck(evaluation, { tokens: { put } })
    if (after.ok) consequences(evaluation, after.evaluation)
    return performance.now() - from
  })
}
