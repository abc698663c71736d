import { requirePermission, type SystemAccess } from '#api/caller.ts'
import { invalidRequest } from '#api/errors.ts'
import type { JobsService, Report } from '#api/features/jobs/jobs.service.ts'
import type {
  HeadWriteService,
  Preview,
  Written,
} from '#api/features/revisions/head-write.service.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import type { NewId } from '#api/platform/ids.ts'
import type { GovernedEdits } from '#shared/checks/governed-model.ts'
import { weakeningsBetween } from '#shared/checks/weakening.ts'
import type { Decision } from '#shared/contracts/governed-system.ts'
import type { ImportWire } from '#shared/contracts/import-outcome.ts'
import type { createImport } from '#shared/contracts/imports.contract.ts'
import type { JobWire } from '#shared/contracts/jobs.contract.ts'
import type { Permission } from '#shared/contracts/permissions.ts'
import type { ParsedOf } from '#shared/contracts/route.ts'
import type { ImportFile } from './import-file.ts'
import type { ItemIds } from './import-names.rules.ts'
import { decideImport } from './imports.rules.ts'
import { presentImport } from './imports.presenter.ts'
import { isLong, tokensIn } from './import-effort.rules.ts'
import { readImport } from './read-import.rules.ts'
import { presentResolverFile } from './resolver-file.presenter.ts'

export interface ImportsDeps {
  readonly heads: HeadsService
  readonly writes: HeadWriteService
  readonly jobs: Pick<JobsService, 'start'>
  readonly newId: NewId
}

type Asked = Pick<ParsedOf<typeof createImport>, 'body' | 'query'> & { readonly requestId: string }

/** What was asked for is done, or goes on as a job. */
export type ImportAnswer =
  | { readonly state: 'done'; readonly outcome: ImportWire }
  | { readonly state: 'deferred'; readonly job: JobWire }

/** Reads files into systems, and systems out as files. */
export function createImportsService(deps: ImportsDeps) {
  const { heads, jobs } = deps
  return {
    async create(system: SystemAccess, asked: Asked): Promise<ImportAnswer> {
      const { model } = await heads.current(system.id)
      if (!isLong(asked.body, model)) {
        return { state: 'done', outcome: await runImport(deps, { system, asked, report: atOnce }) }
      }
      const { requestId, body } = asked
      const request = { system, kind: 'import' as const, requestId, total: tokensIn(body) }
      const job = await jobs.start(request, (report) => runImport(deps, { system, asked, report }))
      return { state: 'deferred', job }
    },

    /** The head as one file. */
    async resolverFile(system: SystemAccess): Promise<string> {
      return presentResolverFile(await heads.current(system.id))
    },
  }
}
export type ImportsService = ReturnType<typeof createImportsService>

const atOnce: Report = () => Promise.resolve()

interface Import {
  readonly system: SystemAccess
  readonly asked: Asked
  readonly report: Report
}

async function runImport(deps: ImportsDeps, { system, asked, report }: Import) {
  const { dryRun, mode, message } = asked.query
  const file = readFile(await deps.heads.current(system.id), asked)
  const total = file.tokens.length
  await report({ total, read: total })
  const decided = createDecision(deps, { system, asked, file })
  const { decide } = decided
  const replaces = mode === 'replace'
  const written: Written & Partial<Preview> = dryRun
    ? await deps.writes.preview({ system, decide, replaces })
    : await deps.writes.write({
        system,
        message,
        origin: 'import',
        replaces,
        decide,
        audit: { action: 'system.imported', subject: system.id },
      })
  await report({ resolved: total, measured: total })
  return outcomeOf(decided.before(), { written, file, asked })
}

function readFile(
  { index }: Head,
  { body, query: { mode, legacyHex, hyphensAsDots } }: Asked,
): ImportFile {
  const stands = (name: string) => mode === 'merge' && index.tokensByName.has(name)
  const read = readImport(body, { stands, legacyHex, hyphensAsDots })
  if (!read.ok) throw invalidRequest(read.faults)
  return read.file
}

/** The write may ask for the decision again, on another head: the last one is what counts. */
function createDecision(
  { newId }: ImportsDeps,
  { system, asked, file }: Omit<Import, 'report'> & { readonly file: ImportFile },
) {
  const { mode, ground, ink } = asked.query
  const ids = createItemIds(newId)
  let last: Head | undefined
  const decide = (head: Head): Decision => {
    last = head
    const decision = decideImport(head.index, file, {
      mode,
      ids,
      span: { ground, ink },
      exempts: mayExempt(system),
    })
    if (decision.ok) requireFor(system, decision.edits)
    return decision
  }
  const before = (): Head => {
    if (last === undefined) throw new TypeError('No write is made without a decision')
    return last
  }
  return { decide, before }
}

function createItemIds(newId: NewId): ItemIds {
  const made = new Map<string, string>()
  return (kind, key) => {
    const place = `${kind} ${key}`
    const id = made.get(place) ?? newId(kind)
    made.set(place, id)
    return id
  }
}

/** Exemptions are the accessibility lead's own: a key is nobody, whoever owns it. */
const mayExempt = ({ role, caller }: SystemAccess): boolean =>
  caller.kind === 'user' && (role === 'accessibility-lead' || role === 'admin')

/** Tokens are what the call takes anyway; what else a file changes takes the permission for that. */
function requireFor(system: SystemAccess, edits: GovernedEdits): void {
  const { pairs, distinctSets, themes, states, prefixes, settings } = edits
  const isEdited = (items: { put?: readonly unknown[]; remove?: readonly unknown[] } = {}) =>
    [items.put, items.remove].some((list) => list !== undefined && list.length > 0)
  const needed: [boolean, Permission][] = [
    [isEdited(pairs), 'pairs:write'],
    [isEdited(distinctSets), 'distinct-sets:write'],
    [themes !== undefined, 'themes:write'],
    [states !== undefined || prefixes !== undefined, 'rules:write'],
    [settings !== undefined, 'settings:write'],
  ]
  for (const [isNeeded, permission] of needed) if (isNeeded) requirePermission(system, permission)
}

interface Outcome {
  readonly written: Written & Partial<Preview>
  readonly file: ImportFile
  readonly asked: Asked
}

function outcomeOf(before: Head, { written, file, asked }: Outcome): ImportWire {
  const { head: after, effect } = written
  const weakens = () => weakeningsBetween(before.evaluation.resolved, after.evaluation.resolved)
  const { dryRun, mode } = asked.query
  return presentImport({
    dryRun,
    mode,
    file,
    before,
    after,
    effect,
    weakens: written.weakenings ?? weakens(),
    written: !dryRun && effect.revision > before.revision,
  })
}
