// @ts-check
import { existsSync } from 'node:fs'
import { relative } from 'node:path'
import { ROOT } from '#scripts/start/project.mjs'
import { demoPeople } from '#scripts/start/seeding.mjs'

/**
 * @param {{ url: string, demoKeyFile: string | undefined }} options no file where there is no demo
 * @returns {string} what a person does next
 */
export function describeReady({ url, demoKeyFile }) {
  const ready = ['', `Dyewright is ready: ${url}`]
  if (demoKeyFile === undefined) return ready.join('\n')
  const commands = existsSync(demoKeyFile) ? commandLines(url, demoKeyFile) : []
  return [...ready, '', 'Sign in as', ...peopleLines(), ...commands, '', 'Ctrl-C stops it.'].join(
    '\n',
  )
}

function peopleLines() {
  const { accounts, password } = demoPeople()
  const listed = accounts.filter((account) => account.listed)
  return [
    ...listed.map(({ email, name, role }) => `  ${email.padEnd(30)}${role.padEnd(20)}${name}`),
    `password  ${password}`,
  ]
}

/**
 * @param {string} url
 * @param {string} keyFile
 */
function commandLines(url, keyFile) {
  const here = relative(process.cwd(), ROOT) || '.'
  const key = `$(cat ${relative(process.cwd(), keyFile)})`
  const candidate = `${here}/scripts/demo/breaching-change.tokens.json`
  return [
    '',
    'Ask for a theme',
    `  curl -H "Authorization: Bearer ${key}" ${url}/v1/systems/larkhaven/themes/dark.css`,
    '',
    'Let the gate judge a change that breaches (fix.tokens.json beside it passes)',
    `  DYEWRIGHT_KEY=${key} node ${here}/dist/gate/dyewright.mjs gate --url ${url} --system larkhaven --new-only --tokens ${candidate}`,
  ]
}
