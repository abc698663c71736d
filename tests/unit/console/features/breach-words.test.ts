import { describe, expect, it } from 'vitest'
import {
  closingInWords,
  eventInWords,
  isMeasured,
} from '#console/features/breaches/breach-words.ts'
import type { BreachEventWire, BreachWire } from '#shared/contracts/breaches.contract.ts'

/** The outer ring of a focus on a button's fill: resolved, though still under its line where `metBy` says so. */
const resolved: BreachWire = {
  id: 'brc_1',
  number: 7,
  foreground: 'focus.outer',
  background: 'action.board.fill',
  kind: 'focus',
  use: 'focus-adjacent',
  theme: 'light',
  state: 'focus/rest',
  origin: 'head',
  status: 'resolved',
  gating: true,
  ratio: 2.66,
  required: 3,
  lowestRatio: 2.66,
  basis: 'srgb',
  rendered: { foreground: '#134068', background: '#2283c1' },
  firstSeenAt: '2026-10-01T00:00:00.000Z',
  lastSeenAt: '2026-10-05T00:00:00.000Z',
  resolvedAt: '2026-10-05T00:00:00.000Z',
  closingReason: 'fixed',
  assignee: null,
  etag: '"1"',
}
const metBy = { foreground: 'focus.inner', background: 'action.board.fill' }

const event = (kind: BreachEventWire['kind'], ratio = 2.66): BreachEventWire => ({
  id: kind,
  kind,
  at: '2026-10-05T00:00:00.000Z',
  ratio,
  required: 3,
  actor: null,
})

describe('how a breach ended', () => {
  it('answers the member of its group that meets the one line which it has', () => {
    expect(closingInWords({ ...resolved, metBy })).toBe('resolved, met by focus.inner')
  })

  it('answers the background too where the member stands on another one', () => {
    const elsewhere = { ...metBy, background: 'surface.hull' }
    expect(closingInWords({ ...resolved, metBy: elsewhere })).toBe(
      'resolved, met by focus.inner on surface.hull',
    )
  })

  it('answers the reason that the check gave where nothing stands in for it', () => {
    expect(closingInWords(resolved)).toBe('resolved, fixed')
    expect(closingInWords({ ...resolved, closingReason: 'pair-removed' })).toBe(
      'resolved, pair removed',
    )
  })
})

describe('an event of a breach', () => {
  it('answers a closing under its line with what met it, as a sentence begins', () => {
    expect(eventInWords(event('resolved'), { ...resolved, metBy })).toBe('Met by focus.inner')
  })

  it('answers a closing over its line as passing, whatever met an earlier one', () => {
    expect(eventInWords(event('resolved', 3.2), { ...resolved, metBy })).toBe('Passed again')
  })

  it('answers what else closed it', () => {
    const exempted = { ...resolved, closingReason: 'exempted' } as const
    expect(eventInWords(event('resolved'), exempted)).toBe('Closed, exempted')
  })

  it('leaves what people made of it out of what was measured', () => {
    const kinds = ['opened', 'assigned', 'worsened', 'commented', 'unassigned', 'resolved'] as const
    expect(kinds.filter((kind) => isMeasured(event(kind)))).toEqual([
      'opened',
      'worsened',
      'resolved',
    ])
  })
})
