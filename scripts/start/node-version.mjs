// @ts-check
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { ROOT } from '#scripts/start/project.mjs'
import { StepFailure } from '#scripts/start/steps.mjs'

/** @returns {string} what was found, for the step's line */
export function checkNodeVersion() {
  const { engines } = JSON.parse(readFileSync(join(ROOT, 'package.json'), 'utf8'))
  const [major, minor] = engines.node.replace('>=', '').split('.').map(Number)
  const [ownMajor = 0, ownMinor = 0] = process.versions.node.split('.').map(Number)
  const enough = ownMajor > major || (ownMajor === major && ownMinor >= minor)
  if (!enough) {
    throw new StepFailure(`Node ${engines.node} is needed; this is ${process.version}.`)
  }
  return process.version
}
