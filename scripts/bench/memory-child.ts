import { checkSystem } from '#shared/checks/check-system.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { systemOf } from './scenario.ts'

/** Tells its parent, in bytes, what the idle process holds and the most that it held during a large check. */
const idle = process.memoryUsage().rss
const checked = checkSystem(systemOf({ tokens: 5_000, pairs: 10_000 }))
if (!checked.ok) throw new TypeError(checked.faults[0]?.detail)
verdictOf(checked.evaluation, { include: 'not-pass' })
process.send?.({ idle, peak: process.resourceUsage().maxRSS * 1024 })
