import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { JudgementOptions } from '#shared/checks/judgement.ts'
import type { ModelFault, WaiverModel } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { breachRatios, verdictOf } from '#shared/checks/verdict.ts'
import {
  type Refusal,
  refuse,
  refuseFaults,
  type SystemIndex,
} from '#shared/contracts/governed-system.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { type CandidateEdits, candidateEdits, unknownNames } from './candidate.rules.ts'
import { type CheckRequest, isWritten, readTokenDocument } from './token-document.rules.ts'

/** What a candidate is merged over and compared with. */
export interface Compared {
  readonly index: SystemIndex
  readonly evaluation: Evaluation
}

export type Measured =
  | {
      readonly ok: true
      readonly evaluation: Evaluation
      /** Ids of the tokens that were sent; absent where none were. */
      readonly sent?: ReadonlySet<string>
    }
  | { readonly ok: false; readonly refusal: Refusal }

/** What the caller's role allows: to exempt the pairs that are sent along. */
export interface Authority {
  readonly exempts: boolean
}

/** Measures what a check asks for, from the head by what differs; without a candidate, the head itself. */
export function measureCandidate(
  head: Compared,
  request: CheckRequest,
  { exempts }: Authority,
): Measured {
  const read = readCandidate(head.index, request)
  const exempted = exempts ? [] : exemptedPairs(request)
  const faults = [...exempted, ...(read.ok ? [] : read.faults)]
  if (!read.ok || faults.length > 0) return refuseFaults(faults)
  if (Object.keys(read.edits).length === 0) return { ok: true, evaluation: head.evaluation }
  const checked = recheck(head.evaluation, read.edits)
  const put = read.edits.tokens?.put
  const sent = put === undefined ? {} : { sent: new Set(put.map(({ id }) => id)) }
  if (checked.ok) return { ...checked, ...sent }
  const unresolved = checked.faults.map((fault) => faultOf(fault, read, head.index))
  return refuse('system-unresolvable', undefined, unresolved)
}

const exemptedPairs = ({ pairs = [] }: CheckRequest): Fault[] =>
  pairs.flatMap(({ exempt }, at) =>
    exempt === undefined
      ? []
      : [{ pointer: `/pairs/${at}/exempt`, detail: 'Only an accessibility-lead exempts a pair' }],
  )

function readCandidate(head: SystemIndex, request: CheckRequest): CandidateEdits {
  const { mode, pairs = [], tokens: given } = request
  if (given === undefined) return candidateEdits(head, { mode, pairs })
  const stands = (name: string) => mode === 'merge' && head.tokensByName.has(name)
  const document = readTokenDocument(given, stands)
  if (document.ok) return candidateEdits(head, { mode, pairs, tokens: document.tokens })
  const isNamed = (name: string) => stands(name) || isWritten(given, name)
  return { ok: false, faults: [...document.faults, ...unknownNames(head, pairs, isNamed)] }
}

function faultOf(
  fault: ModelFault,
  { pointerOf }: Extract<CandidateEdits, { ok: true }>,
  { names }: SystemIndex,
): Fault {
  const pointer = pointerOf(fault)
  return {
    ...(pointer === undefined ? {} : { pointer }),
    detail: fault.detail.replace(/\btok_\w+/g, names.tokenName),
    code: fault.code,
  }
}

/** With `newOnly` what the head has, under the same waivers, is known. */
export function judgingOf(
  head: Compared,
  { newOnly, waivers }: { readonly newOnly: boolean; readonly waivers: readonly WaiverModel[] },
): JudgementOptions & { readonly waivers: readonly WaiverModel[] } {
  if (!newOnly) return { waivers }
  const known = breachRatios(verdictOf(head.evaluation, { waivers, include: 'not-pass' }))
  return { waivers, known }
}
