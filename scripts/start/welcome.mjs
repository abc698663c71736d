// @ts-check
import { existsSync } from 'node:fs'
import { relative } from 'node:path'
import { ROOT } from '#scripts/start/project.mjs'
import { DEMO_KEY_FILE, demoPeople } from '#scripts/start/seeding.mjs'

/**
 * @param {{ settings: import('#scripts/start/settings.mjs').Settings, showDemo: boolean }} options
 * @returns {string} what a person does next
 */
export function describeReady({ settings: { url }, showDemo }) {
  if (!showDemo || !existsSync(DEMO_KEY_FILE)) return `\nDyewright is ready: ${url}`
  const { accounts, password } = demoPeople()
  const people = accounts
    .filter((account) => account.listed)
    .map(({ email, name, role }) => `  ${email.padEnd(30)}${role.padEnd(20)}${name}`)
  const key = `$(cat ${relative(process.cwd(), DEMO_KEY_FILE)})`
  const at = relative(process.cwd(), ROOT) || '.'
  return [
    '',
    `Dyewright is ready: ${url}`,
    '',
    'Sign in as',
    ...people,
    `password  ${password}`,
    '',
    'Ask for a theme',
    `  curl -H "Authorization: Bearer ${key}" ${url}/v1/systems/larkhaven/themes/dark.css`,
    '',
    'Let the gate judge a change that breaches, then its fix',
    `  DYEWRIGHT_KEY=${key} node ${at}/dist/gate/dyewright.mjs gate --url ${url} --system larkhaven --new-only --tokens ${at}/scripts/demo/breaching-change.tokens.json`,
    `  DYEWRIGHT_KEY=${key} node ${at}/dist/gate/dyewright.mjs gate --url ${url} --system larkhaven --new-only --tokens ${at}/scripts/demo/fix.tokens.json`,
    '',
    'Ctrl-C stops it; the data stays in .data.',
  ].join('\n')
}
