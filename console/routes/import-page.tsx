import { useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useMemo, useState } from 'react'
import { type LoaderFunctionArgs, useParams, useSearchParams } from 'react-router-dom'
import { FileField } from '#console/features/imports/file-field.tsx'
import { ImportDecision } from '#console/features/imports/import-decision.tsx'
import {
  contentOf,
  type GivenContent,
  mayBringThemes,
  pastedFile,
  readGivenFile,
} from '#console/features/imports/given-file.ts'
import {
  type ImportOptions,
  queryOf,
  readImportOptions,
} from '#console/features/imports/import-options.ts'
import { ImportSentence } from '#console/features/imports/import-sentence.tsx'
import { JobProgress } from '#console/features/imports/job-progress.tsx'
import type { KeptFile } from '#console/features/imports/kept-file.ts'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { Waiting } from '#console/ui/page-states.tsx'
import { useImportRun } from './import-run.ts'
import { ImportedSection } from './imported-section.tsx'
import { RefusedImport } from './refused-import.tsx'
import { useWhoMay } from './who-may.ts'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await queryClient.ensureQueryData(memberQueries.all(system))
  return null
}

/** A file to be read in: tried first, so that all of what it would change is seen, then imported. */
export function Component() {
  const { system = '' } = useParams()
  const { options, jobId, setOptions, setJob } = useAddress()
  const run = useImportRun(system, { options, jobId, onJob: setJob })
  const [message, setMessage] = useState('')
  const { kept, outcome } = run
  const { given } = kept
  const content = useMemo(() => given && contentOf(given), [given])
  const obstacle = useObstacle(system, run, content?.ok)
  const who = useWhoMay(system)
  const isBusy = run.doing !== undefined
  const messageFault = run.error ? faultAt(writeRefusal(run.error), '/message') : undefined

  const give = (next: KeptFile) => {
    run.forget()
    run.keep(next)
    setOptions(options)
  }
  const send = (dryRun: boolean) => {
    if (isBusy || given === undefined || content?.ok !== true) return
    run.send({ given, content: content.content, dryRun, message })
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (obstacle === undefined) send(false)
  }
  return (
    <>
      <title>{`Import into ${system} · Dyewright`}</title>
      <h2 className="pt-18 text-28 font-semibold">Import a file</h2>
      <p className="mt-4 mb-18 max-w-720 text-ink-soft">
        Design tokens, a resolver file whose contexts become themes, or the custom properties of a
        style sheet; 8&nbsp;MiB and 20,000 tokens at most. Nothing is written until it was tried.
      </p>
      <form onSubmit={submit} className="border-b border-ink pb-18">
        <FileField
          given={given}
          fault={kept.fault ?? (content?.ok === false ? content.detail : undefined)}
          onFile={async (file) => {
            const read = await readGivenFile(file)
            give(read.ok ? { given: read.given } : { ...kept, fault: read.detail })
          }}
          onPaste={(text) => {
            const pasted = pastedFile(text)
            give(pasted === undefined ? {} : { given: pasted })
          }}
          onPutAway={() => give({})}
        />
        <ImportSentence
          options={options}
          kind={kindOf(content)}
          isNamingSpan={content?.ok === true && mayBringThemes(content.content)}
          onChange={(next) => {
            run.forget()
            setOptions(next)
          }}
        />
        <ImportDecision
          message={message}
          onMessage={setMessage}
          messageFault={messageFault}
          doing={run.doing}
          mayTry={content?.ok === true && who.is('maintainer')}
          obstacle={obstacle}
          onTry={() => send(true)}
        />
        {run.error !== null && <RefusedImport error={run.error} />}
      </form>
      <div aria-live="polite">
        {run.job !== undefined && <JobProgress job={run.job} />}
        {isBusy && run.job === undefined && <Waiting>Reading the file</Waiting>}
      </div>
      {outcome !== undefined && !isBusy && <ImportedSection system={system} outcome={outcome} />}
    </>
  )
}

function kindOf(content: GivenContent | undefined): 'document' | 'sheet' | undefined {
  if (content?.ok !== true) return undefined
  return typeof content.content === 'string' ? 'sheet' : 'document'
}

/** How the file is read and which work is looked at, as the address says it. */
function useAddress() {
  const [search, setSearch] = useSearchParams()
  const options = useMemo(() => readImportOptions(search), [search])
  const write = (parts: Record<string, string>) =>
    setSearch(parts, { replace: true, preventScrollReset: true })
  return {
    options,
    jobId: search.get('job'),
    setOptions: (next: ImportOptions) => write(queryOf(next)),
    setJob: (job: string) => write({ ...queryOf(options), job }),
  }
}

/** Why it cannot be imported just now, in a sentence or two. */
function useObstacle(
  system: string,
  { kept, doing, isTried, outcome }: ReturnType<typeof useImportRun>,
  isReadable: boolean | undefined,
): string | undefined {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const who = useWhoMay(system)
  if (!who.is('maintainer')) return `Importing takes a maintainer.${who.oneOf('maintainer')}`
  if (kept.given === undefined) return 'Choose a file or paste one first.'
  if (isReadable !== true) return 'It cannot be read as it stands.'
  if (doing === 'importing') return undefined
  if (doing === 'trying') return 'It is being tried.'
  if (!isTried || outcome === undefined) return 'Try it first: it shows what would change.'
  if (outcome.changes.length === 0) return 'There is nothing to import.'
  if (settings.writeMode === 'review') return 'This system takes edits by review only.'
  if (outcome.weakens.length > 0 && who.role === 'maintainer') {
    return `It asks for less than before, which takes the approval of an accessibility lead.${who.oneOf('accessibility-lead')}`
  }
  return undefined
}
