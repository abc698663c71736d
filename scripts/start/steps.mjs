// @ts-check

/** A step that cannot go on, in words for the person at the terminal: shown without a stack trace. */
export class StepFailure extends Error {}

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
