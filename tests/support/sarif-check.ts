import type { CheckWire } from '#shared/contracts/checks.contract.ts'
import type { FindingWire } from '#shared/contracts/findings.ts'

/** A finding that breaches 1.4.3, but for what a test changes of it. */
export const breachingFinding = (over: Partial<FindingWire> = {}): FindingWire => ({
  foreground: 'action.board.text',
  background: 'action.board.fill',
  theme: 'light',
  state: 'rest/rest',
  use: 'text',
  ratio: 4.49999,
  required: 4.5,
  basis: 'srgb',
  outcome: 'breach',
  gating: true,
  rendered: { foreground: '#faf8f2', background: '#2283c1' },
  fingerprint: 'tok_1|tok_2|tok_3|text|thm_1|rest|rest',
  ...over,
})

export const waiver = { id: 'wvr_7', endsAt: '2026-12-31T00:00:00.000Z' } as const

/** A check with a finding of each outcome and an advisory of each kind. */
export const everyOutcome: CheckWire = {
  id: 'chk_1',
  number: 4413,
  verdict: 'fail',
  counts: { pass: 1, breach: 2, waived: 1, exempt: 1, known: 1 },
  engine: { version: '1.0.0', gamutMap: 'css-color-4', ruleSet: 'wcag-2.2' },
  against: { revision: 214 },
  source: { repository: 'larkhaven/timetable', branch: 'main' },
  caller: { kind: 'key', id: 'key_1', name: 'Timetable pipeline' },
  at: '2026-11-24T09:12:00.000Z',
  findings: [
    breachingFinding(),
    breachingFinding({ theme: 'kiosk', gating: false, fingerprint: 'reporting' }),
    breachingFinding({ outcome: 'waived', waiver, fingerprint: 'waived' }),
    breachingFinding({ outcome: 'known', fingerprint: 'known' }),
    breachingFinding({ outcome: 'exempt', reason: 'logotype', fingerprint: 'exempt' }),
    breachingFinding({ outcome: 'pass', ratio: 7.2, fingerprint: 'pass' }),
  ],
  distinctSets: [],
  advisories: [
    { code: 'double-flip', token: 'text.link', theme: 'dark' },
    { code: 'state-invisible', token: 'text.link', theme: 'light', state: 'hover' },
  ],
}
