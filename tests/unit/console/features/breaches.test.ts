import { describe, expect, it } from 'vitest'
import {
  EVERY_BREACH,
  queryOfFilter,
  readBreachFilter,
  writeBreachFilter,
} from '#console/features/breaches/breach-filter.ts'
import { breachColumns } from '#console/features/breaches/breach-columns.ts'
import { stepsOf } from '#console/features/breaches/breach-time.ts'
import type { BreachEventWire } from '#shared/contracts/breaches.contract.ts'

const event = (at: string, ratio: number): BreachEventWire => ({
  id: at,
  kind: 'opened',
  at,
  ratio,
  required: 4.5,
  actor: null,
})

describe('the filter of the log', () => {
  it('answers the filter from the address and writes only what differs', () => {
    const filter = { ...EVERY_BREACH, status: 'resolved', sort: 'shortfall' } as const
    expect(writeBreachFilter(filter).toString()).toBe('status=resolved&order=shortfall')
    expect(readBreachFilter(writeBreachFilter(filter))).toEqual(filter)
    expect(readBreachFilter(new URLSearchParams('status=lost'))).toEqual(EVERY_BREACH)
  })

  it('answers what the service is asked for, without the words that mean all', () => {
    expect(queryOfFilter(EVERY_BREACH)).toEqual({ status: ['open', 'waived'], sort: 'first-seen' })
    expect(queryOfFilter({ ...EVERY_BREACH, theme: 'dark', origin: 'ci' })).toMatchObject({
      theme: 'dark',
      origin: 'ci',
    })
  })
})

describe('the steps of a breach', () => {
  it('answers each ratio for the share of the time that it held', () => {
    const events = [event('2026-10-01T00:00:00.000Z', 4.3), event('2026-10-04T00:00:00.000Z', 4.2)]
    const steps = stepsOf(events, '2026-10-05T00:00:00.000Z')
    expect(steps.map(({ from, to, ratio }) => [from, to, ratio])).toEqual([
      [0, 0.75, 4.3],
      [0.75, 1, 4.2],
    ])
  })

  it('leaves out the figure of a step that is too short to carry it', () => {
    const events = [event('2026-10-01T00:00:00.000Z', 4.3), event('2026-10-01T01:00:00.000Z', 4.2)]
    const steps = stepsOf(events, '2026-10-20T00:00:00.000Z')
    expect(steps.map(({ labelled }) => labelled)).toEqual([false, true])
  })
})

describe('the columns of the log', () => {
  it('answers as many as there is room for, and their number', () => {
    expect(breachColumns(1440, true)).toEqual({
      where: true,
      firstSeen: true,
      assignee: true,
      count: 8,
    })
    expect(breachColumns(1100, true)).toMatchObject({ firstSeen: true, assignee: false, count: 7 })
    expect(breachColumns(768, true)).toMatchObject({ where: false, count: 5 })
  })

  it('leaves out the column of assignees while nobody is assigned', () => {
    expect(breachColumns(1440, false)).toMatchObject({ assignee: false, count: 7 })
  })
})
