import { describe, expect, it } from 'vitest'
import { createCheckCall, isCheck } from '#scripts/gate/check-call.ts'
import { hasColor } from '#scripts/gate/paint.ts'
import { jsonOf, reportOf } from '#scripts/gate/report.ts'
import { folded, plain } from '#scripts/gate/terminal-text.ts'
import {
  type CheckFindingWire,
  type CheckWire,
  createCheck,
} from '#shared/contracts/checks.contract.ts'

const finding = (over: Partial<CheckFindingWire> = {}): CheckFindingWire => ({
  foreground: 'action.board.text',
  background: 'action.board.fill',
  theme: 'light',
  state: 'rest/rest',
  use: 'text',
  ratio: 3.88049,
  required: 4.5,
  basis: 'srgb',
  outcome: 'breach',
  gating: true,
  rendered: { foreground: '#faf8f2', background: '#2283c1' },
  fingerprint: 'f',
  ...over,
})
const check = (findings: CheckFindingWire[], over: Partial<CheckWire> = {}): CheckWire => ({
  id: 'chk_1',
  number: 4413,
  verdict: findings.length > 0 ? 'fail' : 'pass',
  counts: { pass: 1480, breach: findings.length, waived: 0, exempt: 96, known: 0 },
  engine: { version: '1.0.0', gamutMap: 'css-color-4', ruleSet: 'wcag-2.2' },
  against: { revision: 214 },
  caller: { kind: 'key', id: 'key_1', name: 'Timetable pipeline' },
  at: '2026-11-24T09:12:00.000Z',
  findings,
  advisories: [],
  distinctSets: [],
  ...over,
})
const monochrome = { hasColor: false, columns: 80 }
const wide = { hasColor: false, columns: 200 }

describe('the report', () => {
  it('answers pair, theme, state, ratio, required, and both colours as text', () => {
    const states = ['rest/rest', 'hover/rest']
    const text = reportOf(check(states.map((state) => finding({ state }))), 'larkhaven', monochrome)
    expect(text).toContain('Check 4413 of larkhaven fails, against revision 214.\n')
    expect(text).toContain('Two breaches, 96 exempt, 1480 passing.\n')
    expect(text).toContain('\naction.board.text on action.board.fill, text\n')
    expect(text).toMatch(/^ {2}light {2}rest +3\.8804 +4\.5 +#faf8f2 on #2283c1$/m)
    expect(text).toMatch(/^ {2}light {2}hover on rest +3\.8804 +4\.5 +#faf8f2 on #2283c1$/m)
    expect(text).toContain('Engine 1.0.0, css-color-4, wcag-2.2.')
    expect(text).toContain('Contrast is one criterion; this is no verdict of conformity.')
    expect(text).not.toContain('\u001b')
  })

  it('answers the nearest colour that passes once a pair, and why there is none', () => {
    const nearest: NonNullable<CheckFindingWire['nearest']> = {
      token: 'action.board.fill',
      theme: 'dark',
      state: 'hover',
      source: false,
      color: { colorSpace: 'oklch', components: [0.5512, 0.1241, 243], alpha: 0.9 },
      hex: '#1478b6e6',
      deltaEOk: 0.03,
    }
    const said = (over: Partial<CheckFindingWire>) =>
      reportOf(check([finding(over), finding({ ...over, state: 'focus/rest' })]), 'x', wide)
        .split('\n')
        .filter((line) => line.includes('passes: ') || line.includes('nothing passes'))
        .map((line) => line.trim())
    const color = 'oklch(0.5512 0.1241 243 / 0.9) #1478b6e6 for action.board.fill'
    expect(said({ nearest })).toEqual([`the nearest that passes: ${color} in dark, hover`])
    expect(said({ nearest: { ...nearest, source: true } })).toEqual([
      `the nearest that passes: ${color}`,
    ])
    expect(said({ unmended: { reason: 'locked' } })).toEqual([
      'nothing passes: what it hangs on is locked',
    ])
    const bound = { needed: 20.25, available: 11.37009 }
    const conflict = { requirements: [], bound }
    expect(said({ unmended: { reason: 'conflict', conflict } })).toEqual([
      'nothing passes: the colours on its two sides have 11.3700 to each other, 20.25 is needed',
    ])
    expect(said({ unmended: { reason: 'conflict' } })).toEqual([
      'nothing passes: no colour of its hue meets all it must',
    ])
    const unsearched = reportOf(check([finding({ unmended: { reason: 'budget' } })]), 'x', wide)
    expect(unsearched).toContain('    the nearest that passes was not searched to the end\n')
    expect(said({})).toEqual([])
  })

  it('answers the pair furthest short first', () => {
    const near = finding({ foreground: 'near', ratio: 4.4, required: 4.5 })
    const far = finding({ foreground: 'far', ratio: 2, required: 3 })
    const text = reportOf(check([near, far]), 'x', monochrome)
    expect(text.indexOf('far on')).toBeLessThan(text.indexOf('near on'))
  })

  it('answers a pass without a table, and what is known', () => {
    const counts = { pass: 3, breach: 0, waived: 1, exempt: 0, known: 9 }
    const known = [finding({ outcome: 'known' })]
    const text = reportOf(check(known, { verdict: 'pass', counts }), 'x', monochrome)
    expect(text).toContain('Check 4413 of x passes')
    expect(text).toContain('No breaches, nine known, one waived, no exempt, three passing.')
    expect(text).not.toContain('Theme')
  })

  it('answers what else bears on a breach', () => {
    const said = { reason: 'backdrop-unknown', tight: true, gating: false } as const
    const told = finding({ basis: 'p3', srgbRatio: 4.56789, ...said })
    const text = reportOf(check([told]), 'x', monochrome).replace(/\n {4}/g, ' ')
    expect(text).toContain('measured in Display P3, 4.5678 in sRGB; backdrop unknown;')
    expect(text).toContain('its theme only reports')
  })

  it('answers what the log took of a branch, and nothing without one', () => {
    const source = { repository: 'lark/quay', branch: 'main' }
    const followed = { protected: true, seen: 12, opened: 2, resolved: 0 }
    const text = reportOf(check([finding()], { source, logged: followed }), 'x', monochrome)
    expect(text).toContain(
      '\nLogged for lark/quay, main (protected): twelve sightings, two breaches opened,\nno breaches resolved.\n',
    )
    const passing = { protected: false, seen: 1, opened: 0, resolved: 0 }
    const other = { ...source, branch: 'fog\u001b[31m' }
    const kept = reportOf(check([finding()], { source: other, logged: passing }), 'x', monochrome)
    expect(kept).toContain('\nLogged for lark/quay, fog: one sighting.\n')
    expect(reportOf(check([]), 'x', monochrome)).not.toContain('Logged')
  })

  it('calls for truecolor samples where there is colour, and keeps the words', () => {
    const text = reportOf(check([finding()]), 'x', { hasColor: true, columns: 80 })
    expect(text).toContain(
      '\u001b[38;2;250;248;242;48;2;34;131;193m Aa \u001b[0m #faf8f2 on #2283c1',
    )
  })

  it('leaves no sample for a translucent colour', () => {
    const rendered = { foreground: '#faf8f280', background: '#2283c1' }
    const text = reportOf(check([finding({ rendered })]), 'x', { hasColor: true, columns: 80 })
    expect(text).not.toContain('48;2')
    expect(text).toContain('#faf8f280 on #2283c1')
  })

  it('leaves nothing of terminal escapes, line breaks and direction marks in names', () => {
    const hostile = finding({
      foreground: 'a\u001b[2J\u001b]0;owned\u0007b\r\nPASS\u202e',
      background: 'c\u009b31md',
      theme: 'dark\u001b[8m',
    })
    const text = reportOf(check([hostile]), 'x\u001bc', monochrome)
    for (const sign of '\u001b\u009b\u0007\r\u202e') expect(text).not.toContain(sign)
    expect(text).toContain('abPASS on c31md, text')
  })

  it('answers within 80 columns for names of 255 characters', () => {
    const long = (letter: string) => `${letter.repeat(60)}.`.repeat(4).slice(0, 255)
    const wide = finding({
      foreground: long('a'),
      background: `${'漢'.repeat(120)}.b`,
      theme: 't'.repeat(63),
      rendered: { foreground: '#faf8f280', background: '#2283c180' },
      state: 'disabled/active',
      required: 15.25,
      ratio: 14.123456,
      basis: 'p3',
      tight: true,
    })
    const lines = reportOf(check([wide]), 'x', monochrome).split('\n')
    const columns = (line: string) => line.length + (line.match(/漢/g)?.length ?? 0)
    expect(Math.max(...lines.map(columns))).toBeLessThanOrEqual(80)
    expect(lines.join('').replaceAll(' ', '')).toContain('t'.repeat(16))
  })

  it('answers json that reads back as the check', () => {
    const whole = check([finding()])
    expect(JSON.parse(jsonOf(whole))).toEqual(whole)
  })
})

describe('words of the report', () => {
  it('answers names folded before a dot, nothing left out', () => {
    expect(folded('surface.deck.of.the.ferry', 14)).toEqual(['surface.deck', '.of.the.ferry'])
    expect(folded('👩‍👩‍👧'.repeat(3), 4).join('')).toBe('👩‍👩‍👧'.repeat(3))
  })

  it('answers plain text as it is', () => {
    expect(plain('größe 漢字 👍 {a}')).toBe('größe 漢字 👍 {a}')
  })

  it.each([
    [{}, true, true],
    [{}, false, false],
    [{ NO_COLOR: '1' }, true, false],
    [{ NO_COLOR: '1', FORCE_COLOR: '1' }, true, false],
    [{ NO_COLOR: '' }, true, true],
    [{ FORCE_COLOR: '1' }, false, true],
    [{ FORCE_COLOR: '0' }, true, false],
    [{ TERM: 'dumb' }, true, false],
  ])('answers colour for %j on a terminal (%s): %s', (env, isTerminal, expected) => {
    expect(hasColor(env, isTerminal)).toBe(expected)
  })
})

describe('the call', () => {
  it('answers the method and path of the contract', () => {
    const { operationId, method, path, success } = createCheck
    const { status } = success
    expect(createCheckCall).toEqual({ operationId, method, path, success: { status } })
  })

  it.each([{}, [], 'ok', null, { verdict: 'maybe' }, { verdict: 'pass' }])(
    'refuses %j as a check',
    (answer) => {
      expect(isCheck(answer)).toBe(false)
    },
  )

  it('answers that a check is one', () => {
    expect(isCheck(check([]))).toBe(true)
  })
})
