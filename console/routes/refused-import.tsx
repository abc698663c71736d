import { FaultList } from '#console/features/imports/fault-list.tsx'
import { writeRefusal } from '#console/lib/refusal.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import { ApiError } from '#shared/client/client.ts'
import { RefusedWrite } from './refused-write.tsx'

/** Why a file was not taken: every fault of it with its place, or the refusal as a sentence. */
export function RefusedImport({ error }: { error: Error }) {
  const problem = error instanceof ApiError ? error.problem : undefined
  const faults = (problem?.errors ?? []).map(({ pointer, parameter, detail }) => ({
    place: pointer ?? parameter ?? '',
    detail,
  }))
  const refusal = writeRefusal(error)
  const more = problem?.more ?? 0
  if (faults.some(({ place }) => place !== '')) {
    const count = countOf(faults.length + more, 'fault')
    return (
      <>
        <RefusedWrite
          refusal={{
            ...refusal,
            title: `Nothing is imported: ${count}. ${refusal.title}`,
            faults: [],
          }}
        />
        <FaultList faults={faults} more={more} />
      </>
    )
  }
  if (problem?.status === 404) {
    const title = 'There is no such work any more: it is kept for seven days.'
    return <RefusedWrite refusal={{ ...refusal, title, faults: [] }} />
  }
  return <RefusedWrite refusal={refusal} />
}
