import { expect, it } from 'vitest'
import { delaySeconds, waitSeconds } from '#api/features/sessions/sign-in.rules.ts'

it('answers a delay that doubles after the free attempts and ends growing at 15 minutes', () => {
  expect([0, 4, 5, 6, 7, 14, 15, 200].map((hits) => delaySeconds(hits, 5))).toEqual([
    0, 0, 1, 2, 4, 512, 900, 900,
  ])
})

it('answers what is left of the delay', () => {
  expect(waitSeconds({ hits: 7, elapsedMs: 0 }, 5)).toBe(4)
  expect(waitSeconds({ hits: 7, elapsedMs: 3001 }, 5)).toBe(1)
  expect(waitSeconds({ hits: 7, elapsedMs: 4000 }, 5)).toBe(0)
})

it('answers no wait to a free attempt that another one overtook', () => {
  expect(waitSeconds({ hits: 1, elapsedMs: -40 }, 5)).toBe(0)
})
