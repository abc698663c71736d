import { execFile } from 'node:child_process'
import {
  copyFile,
  mkdir,
  mkdtemp,
  readdir,
  readFile,
  rm,
  symlink,
  writeFile,
} from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'

/** One planted violation a boundary: where the file stands, what it says, which rule must flag it. */
interface Plant {
  readonly file: string
  readonly source: string
  readonly rule: string
}

const RESTRICTED = 'lint/style/noRestrictedImports'
const imports = (file: string, from: string): Plant => ({
  file,
  source: `import { x } from '${from}'\nexport const y = x\n`,
  rule: RESTRICTED,
})

const PLANTS: readonly Plant[] = [
  // shared: pure, and in one direction
  imports('shared/client/a.ts', 'node:fs'),
  imports('shared/client/b.ts', '#api/errors.ts'),
  imports('shared/client/c.ts', 'react'),
  imports('shared/client/d.ts', 'drizzle-orm'),
  imports('shared/color/a.ts', '#shared/checks/model.ts'),
  imports('shared/color/b.ts', 'zod'),
  imports('shared/checks/a.ts', '#shared/contracts/fields.ts'),
  imports('shared/formats/a.ts', '#shared/client/client.ts'),
  imports('shared/contracts/a.ts', '#shared/client/client.ts'),
  imports('shared/checks/b.ts', '#shared/formats/sarif.ts'),
  ...['client', 'color', 'checks', 'formats', 'contracts'].flatMap((folder) =>
    ['mysql2/promise', 'pino', '@tanstack/react-query', 'drizzle-orm'].map((from, at) =>
      imports(`shared/${folder}/io-${at}.ts`, from),
    ),
  ),
  // tables and document: on shared alone
  imports('drizzle/schema/a.ts', '#api/errors.ts'),
  imports('openapi/a.ts', '#api/http/route.ts'),
  imports('openapi/b.ts', '#console/app/paths.ts'),
  // api: routes → service → rules; SQL in repositories only
  imports('api/a.ts', '#console/lib/api.ts'),
  imports('api/b.ts', '#openapi/document.ts'),
  imports('api/http/a.ts', 'drizzle-orm'),
  imports('api/http/b.ts', '#drizzle/schema/tokens.ts'),
  imports('api/http/c.ts', '#api/features/tokens/tokens.service.ts'),
  imports('api/platform/a.ts', '#api/features/tokens/tokens.service.ts'),
  imports('api/platform/b.ts', '#api/http/route.ts'),
  imports('api/platform/c.ts', '#console/lib/format.ts'),
  imports('api/features/tokens/tokens.routes.ts', '#drizzle/schema/tokens.ts'),
  imports('api/features/tokens/more.routes.ts', '#api/features/pairs/pairs.repository.ts'),
  imports('api/features/tokens/reading.routes.ts', './tokens.reads.ts'),
  imports('api/features/tokens/tokens.service.ts', 'express'),
  imports('api/features/tokens/more.service.ts', '#api/http/route.ts'),
  imports('api/features/tokens/other.service.ts', '#api/features/pairs/pairs.repository.ts'),
  imports('api/features/tokens/tokens.rules.ts', 'node:crypto'),
  imports('api/features/tokens/more.rules.ts', '#api/platform/clock.ts'),
  imports('api/features/tokens/tokens.repository.ts', '#shared/contracts/tokens.contract.ts'),
  imports('api/features/tokens/tokens.reads.ts', 'express'),
  imports('api/features/tokens/tokens.presenter.ts', '#drizzle/schema/tokens.ts'),
  imports('api/features/tokens/deciding.rules.ts', './tokens.reads.ts'),
  // of every role, what api/ as a whole never imports
  ...['routes', 'service', 'rules', 'repository', 'reads', 'presenter'].flatMap((role) =>
    ['console', 'openapi', 'scripts', 'tests'].map((folder) =>
      imports(`api/features/tokens/of-${folder}.${role}.ts`, `#${folder}/x.ts`),
    ),
  ),
  // console: app → routes → features → ui, lib
  imports('console/app/a.tsx', '#api/app.ts'),
  imports('console/app/b.tsx', 'node:path'),
  imports('console/features/tokens/a.tsx', '#console/features/pairs/pair-row.tsx'),
  imports('console/features/tokens/b.tsx', '#console/routes/tokens-page.tsx'),
  ...['features/tokens/a.ts', 'routes/a.tsx', 'app/a.ts'].map((from, at) =>
    imports(`console/lib/of-console-${at}.ts`, `#console/${from}`),
  ),
  imports('console/lib/a.ts', '#api/errors.ts'),
  imports('console/ui/a.tsx', '@tanstack/react-query'),
  imports('console/ui/b.tsx', '#shared/client/client.ts'),
  ...['api', 'drizzle', 'openapi', 'scripts', 'tests'].map((folder) =>
    imports(`console/ui/of-${folder}.ts`, `#${folder}/x.ts`),
  ),
  // scripts and tests
  imports('scripts/gate/a.ts', '#drizzle/schema/tokens.ts'),
  imports('scripts/gate/b.ts', '#api/app.ts'),
  imports('scripts/gate/c.ts', '#shared/formats/theme-css.ts'),
  imports('tests/unit/a.ts', '../api/app.ts'),
  // every file
  {
    file: 'api/features/tokens/default.ts',
    source: 'export default 1\n',
    rule: 'lint/style/noDefaultExport',
  },
  {
    file: 'shared/color/long.ts',
    source: Array.from({ length: 301 }, (_, at) => `export const line${at} = ${at}\n`).join(''),
    rule: 'lint/style/noExcessiveLinesPerFile',
  },
  {
    file: 'shared/color/long-function.ts',
    source: `export function f(x: number) {\n${'  x += 1\n'.repeat(61)}  return x\n}\n`,
    rule: 'lint/complexity/noExcessiveLinesPerFunction',
  },
  {
    file: 'shared/color/types-only.ts',
    source: "import { Oklch } from './oklch.ts'\nexport const f = (x: Oklch) => x\n",
    rule: 'lint/style/useImportType',
  },
  {
    file: 'shared/color/BadName.ts',
    source: 'export const x = 1\n',
    rule: 'lint/style/useFilenamingConvention',
  },
  {
    file: 'shared/color/barrel.ts',
    source: "export * from './oklch.ts'\n",
    rule: 'lint/performance/noBarrelFile',
  },
  {
    file: 'api/platform/chatty.ts',
    source: "console.log('x')\nexport const x = 1\n",
    rule: 'lint/suspicious/noConsole',
  },
  {
    file: 'api/platform/floating.ts',
    source: 'const later = async () => 1\nexport function go() {\n  later()\n}\n',
    rule: 'lint/nursery/noFloatingPromises',
  },
]

interface Report {
  readonly diagnostics: readonly { readonly category: string; readonly location: unknown }[]
}

let tree: string
let flagged: Map<string, Set<string>>

const lint = (folder: string) =>
  new Promise<Report>((resolve, reject) => {
    const biome = join(import.meta.dirname, '../../node_modules/.bin/biome')
    const args = ['lint', '--reporter=json', '--max-diagnostics=none', '--vcs-enabled=false', '.']
    execFile(biome, args, { cwd: folder, maxBuffer: 1 << 26 }, (_, stdout) => {
      try {
        resolve(JSON.parse(stdout) as Report)
      } catch (cause) {
        reject(cause)
      }
    })
  })

const SOURCES = ['api', 'console', 'drizzle', 'openapi', 'scripts', 'shared', 'tests']
const MOST_LINES = 300

const CYCLE = ['shared/color/cycle-a.ts', 'shared/color/cycle-b.ts'] as const

const plant = async (file: string, source: string) => {
  const path = join(tree, file)
  await mkdir(dirname(path), { recursive: true })
  await writeFile(path, source)
}

beforeAll(async () => {
  tree = await mkdtemp(join(tmpdir(), 'dyewright-boundaries-'))
  const root = join(import.meta.dirname, '../..')
  for (const name of ['biome.json', 'package.json', 'tsconfig.json']) {
    await copyFile(join(root, name), join(tree, name))
  }
  await symlink(join(root, 'node_modules'), join(tree, 'node_modules'))
  await plant('shared/color/oklch.ts', 'export interface Oklch {\n  readonly l: number\n}\n')
  for (const { file, source } of PLANTS) await plant(file, source)
  await plant(CYCLE[0], "import { b } from './cycle-b.ts'\nexport const a = () => b\n")
  await plant(CYCLE[1], "import { a } from './cycle-a.ts'\nexport const b = () => a\n")
  flagged = new Map()
  for (const { category, location } of (await lint(tree)).diagnostics) {
    const { path } = location as { path: string | { file: string } }
    const file = (typeof path === 'string' ? path : path.file).replace(/^\.\//, '')
    flagged.set(file, (flagged.get(file) ?? new Set()).add(category))
  }
})

afterAll(() => rm(tree, { recursive: true, force: true }))

describe('the lint of the layout', () => {
  it.each(PLANTS)('refuses $rule planted in $file', ({ file, rule }) => {
    expect([...(flagged.get(file) ?? [])]).toContain(rule)
  })

  it('refuses a cycle of imports', () => {
    expect([...(flagged.get(CYCLE[0]) ?? [])]).toContain('lint/suspicious/noImportCycles')
  })

  it('leaves no source more than 300 lines, counted where the lint does not', async () => {
    // The lint counts no line within a template or a block comment.
    const root = join(import.meta.dirname, '../..')
    const lists = await Promise.all(
      SOURCES.map(async (folder) =>
        (await readdir(join(root, folder), { recursive: true })).map((name) => join(folder, name)),
      ),
    )
    const files = lists.flat().filter((name) => /\.(tsx?|mjs|css)$/.test(name))
    expect(files.length).toBeGreaterThan(300)
    const long = await Promise.all(
      files.map(async (name) => {
        const text = await readFile(join(root, name), 'utf8')
        return text.split('\n').length - 1 > MOST_LINES ? [name] : []
      }),
    )
    expect(long.flat()).toEqual([])
  })

  it('leaves a clean file alone', () => {
    expect(flagged.has('shared/color/oklch.ts')).toBe(false)
  })
})
