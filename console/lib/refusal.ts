import { ApiError } from '#shared/client/client.ts'
import { startSentence } from './format.ts'

/** Why a write was not taken, as far as a screen has to tell it apart. */
export interface WriteRefusal {
  readonly kind: 'signed-out' | 'changed' | 'refused' | 'unreachable'
  /** One sentence. */
  readonly title: string
  /** What is wrong in particular, each with where in the body it lies. */
  readonly faults: readonly { readonly pointer: string; readonly detail: string }[]
  /** Where it has changed meanwhile: as it is now. */
  readonly current?: unknown
}

/** Reads a failed write. */
export function writeRefusal(error: Error): WriteRefusal {
  if (!(error instanceof ApiError)) {
    return {
      kind: 'unreachable',
      title: 'The service does not answer. What you typed is kept; try once more.',
      faults: [],
    }
  }
  const { problem, status } = error
  if (status === 401) {
    return { kind: 'signed-out', title: 'Your session has ended, nothing was saved.', faults: [] }
  }
  const said = problem?.detail ?? problem?.title ?? `The service answered ${status}`
  return {
    kind: status === 412 ? 'changed' : 'refused',
    title: asSentence(said),
    faults: (problem?.errors ?? []).map(({ pointer = '', detail }) => ({
      pointer,
      detail: asSentence(detail),
    })),
    ...(status === 412 ? { current: problem?.current } : {}),
  }
}

function asSentence(text: string): string {
  return startSentence(text).replace(/\.?$/, '.')
}

/** The first fault at a place of the body, or under it. */
export function faultAt(refusal: WriteRefusal | undefined, pointer: string): string | undefined {
  return refusal?.faults.find(
    (fault) => fault.pointer === pointer || fault.pointer.startsWith(`${pointer}/`),
  )?.detail
}
