import { expect, it } from 'vitest'
import { type DatabaseSettings, unsafeSettings } from '#api/platform/database-settings.ts'

const sound: DatabaseSettings = {
  flush: 1,
  sqlMode: 'STRICT_TRANS_TABLES,NO_ENGINE_SUBSTITUTION',
  charset: 'utf8mb4',
  collation: 'utf8mb4_nopad_bin',
  timeZone: '+00:00',
  systemTimeZone: 'CET',
}

it('answers nothing against sound settings', () => {
  expect(unsafeSettings(sound, false)).toEqual([])
  expect(unsafeSettings({ ...sound, timeZone: 'SYSTEM', systemTimeZone: 'UTC' }, false)).toEqual([])
})

it.each([
  ['flush', { flush: 0 }, 'innodb_flush_log_at_trx_commit'],
  ['flush', { flush: 2 }, 'innodb_flush_log_at_trx_commit'],
  ['mode', { sqlMode: 'NO_ENGINE_SUBSTITUTION' }, 'sql_mode'],
  ['charset', { charset: 'latin1' }, 'character set'],
  ['collation', { collation: 'utf8mb4_general_ci' }, 'collation'],
  ['zone', { timeZone: '+01:00' }, 'time_zone'],
  ['zone', { timeZone: 'SYSTEM' }, 'time_zone'],
] as const)('refuses an unsafe %s: %o', (_, change, word) => {
  const refusals = unsafeSettings({ ...sound, ...change }, false)
  expect(refusals).toHaveLength(1)
  expect(refusals[0]).toContain(word)
})

it('leaves only the flush to tests', () => {
  expect(unsafeSettings({ ...sound, flush: 0 }, true)).toEqual([])
  expect(unsafeSettings({ ...sound, flush: 0, charset: 'latin1' }, true)).toHaveLength(1)
})
