// @ts-check
import { causeOf } from '#scripts/start/causes.mjs'

/** A step that cannot go on, in words for the person at the terminal: shown without a stack trace. */
export class StepFailure extends Error {
  /**
   * @param {string} message
   * @param {{ said?: string }} [options] `said`: all that the failed program said, of which `message` shows the end
   */
  constructor(message, { said = message } = {}) {
    super(message)
    this.said = said
  }
}

const NAME_WIDTH = 12

/**
 * Runs one step and shows what it did and how long it took.
 * @template T
 * @param {string} name one or two words
 * @param {(say: (detail: string) => void) => T | Promise<T>} work
 * @returns {Promise<T>}
 */
export async function step(name, work) {
  const from = performance.now()
  let detail = ''
  const show = () => {
    const seconds = ((performance.now() - from) / 1000).toFixed(1)
    console.log(`${name.padEnd(NAME_WIDTH)}${seconds.padStart(6)} s  ${detail}`.trimEnd())
  }
  try {
    const result = await work((text) => {
      detail = text
    })
    show()
    return result
  } catch (error) {
    detail = 'failed'
    show()
    throw error
  }
}

/**
 * @param {unknown} error
 * @returns {string} for the terminal: what to do, where that is known, then what was said
 */
export function describeFailure(error) {
  if (!(error instanceof Error)) return String(error)
  const cause = causeOf(error instanceof StepFailure ? error.said : error.message)
  if (cause !== undefined) return `${cause}\n\n${error.message}`
  return error instanceof StepFailure ? error.message : (error.stack ?? error.message)
}
