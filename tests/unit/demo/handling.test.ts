import { describe, expect, it } from 'vitest'
import { handling, pipelines, protectedBranches } from '#scripts/demo/larkhaven/handling.ts'
import { larkhaven } from '#scripts/demo/larkhaven/larkhaven.ts'
import { wholeAfter } from '#scripts/demo/larkhaven/whole-system.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { breachRatios, verdictOf } from '#shared/checks/verdict.ts'
import { modelFromWire } from '#shared/contracts/system-model.ts'
import { namesIn, presentFinding } from '#shared/contracts/present-finding.ts'

const model = modelFromWire(wholeAfter(larkhaven))
const head = checkSystem(model)
if (!head.ok) throw new Error(JSON.stringify(head.faults))
const names = namesIn(head.evaluation.resolved)
const breaches = verdictOf(head.evaluation)
  .findings.filter(({ outcome }) => outcome === 'breach')
  .map((finding) => presentFinding(finding, names))

/** What a run of a pipeline has and the head has not. */
const newIn = (color: NonNullable<(typeof pipelines)[number]['runs'][number]['color']>) => {
  const token = model.tokens.find(({ name }) => name === color.token)
  if (token === undefined) throw new Error(`${color.token} is no token of the demo`)
  const [l, c, h] = color.oklch
  const value = { kind: 'color', color: { l, c, h, alpha: 1 } } as const
  const checked = recheck(head.evaluation, { tokens: { put: [{ ...token, value }] } })
  if (!checked.ok) throw new Error(JSON.stringify(checked.faults))
  const known = breachRatios(verdictOf(head.evaluation))
  return verdictOf(checked.evaluation, { known }).findings.filter(
    ({ outcome }) => outcome === 'breach',
  )
}

describe('the handling of the demo', () => {
  it.each(handling)('calls a breach of the head by its name: $of', ({ of }) => {
    expect(breaches).toEqual(expect.arrayContaining([expect.objectContaining(of)]))
  })

  it('answers two pipelines, of which one has a protected branch', () => {
    const isProtected = ({ repository }: { repository: string }) =>
      protectedBranches.some((branch) => branch.repository === repository)
    expect(pipelines.map(isProtected)).toEqual([true, false])
  })

  it('leaves one breach open on the protected branch, and one fixed', () => {
    const onMain = pipelines.flatMap(({ runs }) => runs.filter(({ branch }) => branch === 'main'))
    const found = onMain.map(({ color }) => (color === undefined ? 0 : newIn(color).length))
    expect(found).toEqual([1, 0, 1])
  })

  it('answers each run of the other pipeline with something to see', () => {
    for (const { color } of pipelines[1]?.runs ?? []) {
      expect(color && newIn(color)).not.toEqual([])
    }
  })
})
