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
  if (problem !== undefined && faults.length > 0) {
    const count = countOf(faults.length + more, 'fault')
    const hasPlaces = faults.some(({ place }) => place !== '')
    const title = hasPlaces
      ? `Nothing is imported: the file has ${count}.`
      : `Nothing is imported: ${problem.title.charAt(0).toLowerCase()}${problem.title.slice(1)}.`
    // Names of tokens begin some of these sentences: they stay as they are written.
    const details = faults.map(({ detail }) => ({ pointer: '', detail: `${detail}.` }))
    return (
      <>
        <RefusedWrite refusal={{ ...refusal, title, faults: hasPlaces ? [] : details }} />
        {hasPlaces && <FaultList faults={faults} more={more} />}
      </>
    )
  }
  if (problem?.status === 404) {
    const title = 'There is no such work any more: it is kept for seven days.'
    return <RefusedWrite refusal={{ ...refusal, title, faults: [] }} />
  }
  return <RefusedWrite refusal={refusal} />
}
