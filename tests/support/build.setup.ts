import { existsSync, readdirSync, rmSync, statSync } from 'node:fs'
import { join } from 'node:path'
import type { TestProject } from 'vitest/node'
import { build, isBuilt, sourcesDigest } from '#scripts/build.mjs'
import { DATA, DIST } from '#scripts/start/project.mjs'

declare module 'vitest' {
  interface ProvidedContext {
    /** The folder of a build of the present sources: `api/server.js`, `gate/dyewright.mjs`, `console/` … */
    dist: string
  }
}

const BUILDS = join(DATA, 'test-builds')
const KEPT_MS = 24 * 60 * 60 * 1000

/**
 * Leaves `dist` alone: a service that runs from it keeps the files it was started on. A build of other
 * sources goes to a folder named after them, which later runs on the same sources find.
 */
export async function setup(project: TestProject): Promise<void> {
  project.provide('dist', await builtFolder())
}

async function builtFolder(): Promise<string> {
  if (isBuilt(DIST)) return DIST
  const folder = join(BUILDS, sourcesDigest().slice(0, 16))
  if (!isBuilt(folder)) await build(folder)
  removeOldBuilds(folder)
  return folder
}

function removeOldBuilds(current: string): void {
  if (!existsSync(BUILDS)) return
  for (const name of readdirSync(BUILDS)) {
    const folder = join(BUILDS, name)
    if (folder === current || Date.now() - statSync(folder).mtimeMs < KEPT_MS) continue
    rmSync(folder, { recursive: true, force: true })
  }
}
