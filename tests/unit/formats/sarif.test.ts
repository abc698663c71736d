import { describe, expect, it } from 'vitest'
import type { FindingWire } from '#shared/contracts/findings.ts'
import { sarifOf } from '#shared/formats/sarif.ts'
import { breachingFinding, everyOutcome, waiver } from '#tests/support/sarif-check.ts'

const runOf = (findings: FindingWire[]) =>
  sarifOf({ ...everyOutcome, findings, advisories: [] }, 'larkhaven').runs[0]!
const resultOf = (over: Partial<FindingWire> = {}) => runOf([breachingFinding(over)]).results[0]!
const ruleOf = (over: Partial<FindingWire>) => resultOf(over).ruleId

// Meanings of kind, level and suppression: SARIF 2.1.0 errata 01, 3.27.9, 3.27.10, 3.27.23, 3.35.
describe('what an outcome means', () => {
  it('answers a breach as an error, and as a warning where its theme only reports', () => {
    expect(resultOf()).toMatchObject({ kind: 'fail', level: 'error' })
    expect(resultOf({ gating: false })).toMatchObject({ kind: 'fail', level: 'warning' })
    expect(resultOf().suppressions).toEqual([])
  })

  it('answers a waived breach suppressed, with its waiver and its end', () => {
    const result = resultOf({ outcome: 'waived', waiver })
    expect(result).toMatchObject({ kind: 'fail', level: 'error' })
    expect(result.suppressions).toEqual([
      {
        kind: 'external',
        status: 'accepted',
        justification: `Waiver wvr_7, until ${waiver.endsAt}`,
      },
    ])
    expect(result.message.text).toContain(`A waiver allows it until ${waiver.endsAt}.`)
  })

  it('answers a known breach as a note, an exempt one as not applicable, a pass as a pass', () => {
    expect(resultOf({ outcome: 'known' })).toMatchObject({ kind: 'fail', level: 'note' })
    const exempt = resultOf({ outcome: 'exempt', reason: 'logotype' })
    expect(exempt).toMatchObject({ kind: 'notApplicable', level: 'none' })
    expect(exempt.message.text).toContain('It is exempt. Reason: logotype.')
    expect(resultOf({ outcome: 'pass', ratio: 7 })).toMatchObject({ kind: 'pass', level: 'none' })
  })

  it('answers an advisory as information about its token', () => {
    const [, second] = sarifOf({ ...everyOutcome, findings: [] }, 'x').runs[0]!.results
    expect(second).toMatchObject({
      ruleId: 'state-invisible',
      kind: 'informational',
      level: 'none',
      message: { text: 'text.link in light, hover: A state can hardly be told from rest.' },
      properties: { theme: 'light', state: 'hover' },
    })
  })
})

// WCAG 2.2: 1.4.3, 1.4.6, 1.4.11, 2.4.13, and 1.4.1 by technique G183.
describe('the rule of a finding', () => {
  it.each([
    ['WCAG-1.4.3', { use: 'text', required: 4.5, ratio: 4.4 }],
    ['WCAG-1.4.6', { use: 'text', required: 7, ratio: 6.9 }],
    ['WCAG-1.4.3', { use: 'large-text', required: 3, ratio: 2.9 }],
    ['WCAG-1.4.6', { use: 'large-text', required: 4.5, ratio: 4.4 }],
    ['WCAG-1.4.11', { use: 'non-text', required: 3, ratio: 2.9 }],
    ['WCAG-1.4.11', { use: 'focus-adjacent', required: 3, ratio: 2.9 }],
    ['WCAG-2.4.13', { use: 'focus-change', required: 3, ratio: 2.9 }],
    ['WCAG-2.4.13', { use: 'focus-change', required: 0, ratio: 1.1, outcome: 'pass' }],
    ['WCAG-1.4.1', { use: 'link-in-text', required: 3, ratio: 2.9 }],
  ] as const)('answers %s to %j', (ruleId, over) => {
    expect(ruleOf(over)).toBe(ruleId)
  })

  it('answers no criterion where the criterion is met and a higher minimum is not', () => {
    expect(ruleOf({ required: 6, ratio: 4.5 })).toBe('pair-minimum')
    expect(ruleOf({ required: 6, ratio: 4.49 })).toBe('WCAG-1.4.3')
    expect(ruleOf({ required: 9, ratio: 7 })).toBe('pair-minimum')
    expect(ruleOf({ use: 'focus-change', required: 2, ratio: 1.5 })).toBe('pair-minimum')
  })

  it('answers no criterion where the ratio on P3 luminance is short and the one of WCAG is not', () => {
    const p3 = { basis: 'p3', required: 4.5, ratio: 4.4 } as const
    expect(ruleOf({ ...p3, srgbRatio: 4.6 })).toBe('display-p3')
    expect(ruleOf({ ...p3, srgbRatio: 4.5 })).toBe('display-p3')
    expect(ruleOf({ ...p3, srgbRatio: 4.49 })).toBe('WCAG-1.4.3')
    expect(ruleOf({ ...p3, required: 6, srgbRatio: 5 })).toBe('pair-minimum')
    expect(ruleOf({ ...p3, required: 6, srgbRatio: 6.1 })).toBe('display-p3')
    expect(ruleOf({ ...p3, outcome: 'pass', ratio: 5, srgbRatio: 6 })).toBe('WCAG-1.4.3')
  })

  it("answers no criterion to what WCAG exempts and the system's floor does not", () => {
    expect(ruleOf({ required: 2, ratio: 1.5, reason: 'disabled-floor' })).toBe('disabled-floor')
  })
})

describe('a result', () => {
  it('answers its tokens as logical locations, and its identity as its fingerprint', () => {
    expect(resultOf()).toMatchObject({
      locations: [
        { logicalLocations: [{ fullyQualifiedName: 'action.board.text', kind: 'property' }] },
      ],
      relatedLocations: [{ logicalLocations: [{ fullyQualifiedName: 'action.board.fill' }] }],
      partialFingerprints: { 'findingIdentity/v1': breachingFinding().fingerprint },
      properties: { theme: 'light', state: 'rest/rest', ratio: 4.49999, required: 4.5 },
    })
  })

  it('leaves the fingerprint where a name, a ratio or a requirement moves', () => {
    const moved = resultOf({ foreground: 'renamed', ratio: 2, required: 7, gating: false })
    expect(moved.partialFingerprints).toEqual(resultOf().partialFingerprints)
  })

  it('answers the ratio cut and never rounded, with place and requirement', () => {
    expect(resultOf({ state: 'hover/rest' }).message.text).toBe(
      'action.board.text on action.board.fill (text) is 4.4999:1 in light, hover on rest; 4.5:1 is required.',
    )
  })

  it('answers where a measure is outside of WCAG’s definition, and what else bears on it', () => {
    const { text } = resultOf({ basis: 'p3', tight: true, gating: false }).message
    expect(text).toContain("WCAG's ratio on P3 luminance, outside its definition.")
    expect(resultOf({ basis: 'p3', srgbRatio: 4.61239 }).message.text).toContain(
      "WCAG's ratio on P3 luminance, outside its definition. By WCAG's own measure, on sRGB, it is 4.6123:1.",
    )
    expect(text).toContain('One level of a translucent layer would flip it.')
    expect(text).toContain('Its theme only reports.')
  })

  it('leaves a name that would ask for an argument or make a link as text', () => {
    // SARIF 2.1.0 errata 01, 3.11.5 and 3.11.6.
    const { message, locations } = resultOf({ foreground: 'a{0} [x](https://y.example)' })
    expect(message.text).toContain('a{{0}} [x\\](https://y.example) on ')
    expect(locations[0]?.logicalLocations[0].fullyQualifiedName).toBe('a{0} [x](https://y.example)')
  })
})

describe('a run', () => {
  it('answers what the verdict was made with, and which system and check it is of', () => {
    const run = runOf([])
    expect(run.tool.driver).toMatchObject({ name: 'Dyewright', version: '1.0.0' })
    expect(run.automationDetails).toEqual({ id: 'dyewright/larkhaven/4413' })
    const { findings, advisories, ...summary } = everyOutcome
    expect(run.properties).toEqual(summary)
  })

  it('answers with the tool and with every rule that contrast is one criterion', () => {
    const { fullDescription, rules } = runOf([]).tool.driver
    for (const said of [fullDescription, ...rules.map(({ help }) => help)]) {
      expect(said.text).toContain('Contrast is one criterion')
    }
  })
})
