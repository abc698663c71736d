import { history } from './history.ts'
import { opening } from './opening.ts'
import type { Step } from './step.ts'

/** Every revision of the demo system, in order. */
export const larkhaven: readonly Step[] = [...opening, ...history]
