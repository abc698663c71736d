import { useMutation, useQuery } from '@tanstack/react-query'
import { useEffect } from 'react'
import type { GivenContent, GivenFile } from '#console/features/imports/given-file.ts'
import { type ImportOptions, optionsKey } from '#console/features/imports/import-options.ts'
import { jobQueries, sendImport } from '#console/features/imports/imports.queries.ts'
import { type KeptFile, useKeptFile } from '#console/features/imports/kept-file.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { ApiError } from '#shared/client/client.ts'
import type { ImportWire } from '#shared/contracts/import-outcome.ts'
import type { JobWire } from '#shared/contracts/jobs.contract.ts'

interface Sent {
  readonly given: GivenFile
  readonly content: Extract<GivenContent, { ok: true }>['content']
  readonly dryRun: boolean
  readonly message: string
}

/** Trying and importing a file, whether it is answered at once or as work that goes on. */
export function useImportRun(
  system: string,
  where: {
    readonly options: ImportOptions
    readonly jobId: string | null
    readonly onJob: (id: string) => void
  },
) {
  const { options, jobId, onJob } = where
  const [kept, keep] = useKeptFile(system)
  const readAgain = () => queryClient.invalidateQueries({ queryKey: ['system', system] })
  const sending = useMutation({
    mutationFn: ({ content, dryRun, message }: Sent) =>
      sendImport({ system, content, options, dryRun, message }),
    onSuccess: async (answer, { given, dryRun }) => {
      if (answer.kind === 'job') {
        keep({ given, job: { id: answer.job.id, options: optionsKey(options) } })
        onJob(answer.job.id)
      } else if (!dryRun) {
        keep({})
        await readAgain()
      }
    },
  })
  const job = useQuery({ ...jobQueries.one(system, jobId ?? ''), enabled: jobId !== null })
  const running = jobId === null ? undefined : job.data
  const imported = running?.kind === 'import' ? running.result : undefined
  const isWritten = imported?.written === true
  // biome-ignore lint/correctness/useExhaustiveDependencies: once for each work that ends in a revision
  useEffect(() => {
    if (!isWritten) return
    if (kept.job?.id === jobId) keep({})
    void readAgain()
  }, [isWritten, jobId])
  const direct = sending.data?.kind === 'done' ? sending.data.outcome : undefined
  const outcome = jobId === null ? direct : imported
  return {
    kept,
    keep,
    send: sending.mutate,
    forget: sending.reset,
    job: running?.state === 'running' ? running : undefined,
    outcome,
    isTried: outcome?.dryRun === true && isOf(outcome, { kept, jobId, options }),
    doing: doingOf(sending, running),
    error: sending.error ?? (jobId === null ? null : (job.error ?? failureOf(running))),
  }
}

/** Whether an answer is that of the file in hand, read as it is to be read. */
function isOf(
  { mode }: ImportWire,
  of: { kept: KeptFile; jobId: string | null; options: ImportOptions },
): boolean {
  const { kept, jobId, options } = of
  if (kept.given === undefined || mode !== options.mode) return false
  return jobId === null || (kept.job?.id === jobId && kept.job.options === optionsKey(options))
}

function doingOf(
  { isPending, variables }: { isPending: boolean; variables: Sent | undefined },
  running: JobWire | undefined,
): 'trying' | 'importing' | undefined {
  if (!isPending && running?.state !== 'running') return undefined
  return variables?.dryRun === false ? 'importing' : 'trying'
}

/** Work that failed is refused as the request would have been. */
function failureOf(job: JobWire | undefined): ApiError | null {
  return job?.problem === undefined ? null : new ApiError(job.problem.status, job.problem)
}
