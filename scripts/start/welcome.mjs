// @ts-check
import { existsSync } from 'node:fs'
import { join, relative } from 'node:path'
import { ROOT } from '#scripts/start/project.mjs'
import { demoPeople } from '#scripts/start/seeding.mjs'

/**
 * @param {{ url: string, gate: string, demoKeyFile: string | undefined }} options no key where there is no demo
 * @returns {string} what a person does next
 */
export function describeReady({ url, gate, demoKeyFile }) {
  const ready = ['', `Dyewright is ready: ${url}`]
  if (demoKeyFile === undefined) return ready.join('\n')
  const commands = existsSync(demoKeyFile) ? commandLines({ url, gate, demoKeyFile }) : []
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

/** @param {{ url: string, gate: string, demoKeyFile: string }} options */
function commandLines({ url, gate, demoKeyFile }) {
  const key = `$(cat ${shown(demoKeyFile)})`
  const candidate = shown(join(ROOT, 'scripts/demo/breaching-change.tokens.json'))
  return [
    '',
    'Ask for a theme',
    `  curl -H "Authorization: Bearer ${key}" ${url}/v1/systems/larkhaven/themes/dark.css`,
    '',
    'Let the gate judge a change that breaches (fix.tokens.json beside it passes)',
    `  DYEWRIGHT_KEY=${key} node ${shown(gate)} gate --url ${url} --system larkhaven --new-only --tokens ${candidate}`,
  ]
}

/** @param {string} path */
function shown(path) {
  return relative(process.cwd(), path)
}
