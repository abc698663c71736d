import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import type { ImportWire } from '#shared/contracts/import-outcome.ts'
import { createImport } from '#shared/contracts/imports.contract.ts'
import { getJob, type JobWire } from '#shared/contracts/jobs.contract.ts'
import { type ImportOptions, queryOf } from './import-options.ts'

export interface WantedImport {
  readonly system: string
  /** What the file says: a document, or the text of a style sheet. */
  readonly content: Record<string, unknown> | string
  readonly options: ImportOptions
  readonly dryRun: boolean
  readonly message: string
}

/** What was asked for is done, or goes on as a job. */
export type ImportAnswer =
  | { readonly kind: 'done'; readonly outcome: ImportWire }
  | { readonly kind: 'job'; readonly job: JobWire }

/** Reads a file into the system, or tells what that would change. */
export async function sendImport(wanted: WantedImport): Promise<ImportAnswer> {
  const { system, content, options, dryRun, message } = wanted
  const why = message.trim()
  const { status, body } = await call(createImport, {
    params: { system },
    query: {
      ...queryOf(options),
      dryRun: dryRun ? 'true' : 'false',
      ...(why === '' || dryRun ? {} : { message: why }),
    },
    body: content,
  })
  return status === 202
    ? { kind: 'job', job: body as JobWire }
    : { kind: 'done', outcome: body as ImportWire }
}

const POLL_MS = 1000

export const jobQueries = {
  /** How far long work is; asked again while it runs. Not under the system's key: an import does not stale it. */
  one: (system: string, id: string) =>
    queryOptions({
      queryKey: ['job', system, id],
      queryFn: async () => (await call(getJob, { params: { system, id } })).body,
      refetchInterval: ({ state: { data } }) => (data?.state === 'running' ? POLL_MS : false),
    }),
}
