// @ts-check
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

export const ROOT = fileURLToPath(new URL('../..', import.meta.url))
/** What a run leaves behind: the database, its log, the demo's key. Never committed. */
export const DATA = join(ROOT, '.data')
export const DIST = join(ROOT, 'dist')
