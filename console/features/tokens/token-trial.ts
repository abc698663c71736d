import { useEffect, useMemo, useState } from 'react'
import { consequences } from '#shared/checks/consequences.ts'
import type { Checked, Evaluation } from '#shared/checks/evaluation.ts'
import type { SourceValue } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { findingsOf } from '#shared/checks/token-standing.ts'
import { movedGroups } from './moved-lines.ts'
import { pairStandings } from './pair-standings.ts'
import { followersOf } from './relation-words.ts'

/** What is tried, measured: the evaluation with it, or why there is none. */
export function useTried(
  present: Evaluation | undefined,
  token: string,
  value: SourceValue | undefined,
): Checked | undefined {
  const drawn = useFrameValue(value)
  return useMemo(() => {
    const model = present?.resolved.tokens.get(token)?.token
    if (present === undefined || model === undefined || drawn === undefined) return undefined
    return recheck(present, { tokens: { put: [{ ...model, value: drawn }] } })
  }, [present, token, drawn])
}

/** The value of the last frame: however fast it changes, it is measured once a frame. */
function useFrameValue<Value>(value: Value): Value {
  const [shown, setShown] = useState(value)
  useEffect(() => {
    const frame = requestAnimationFrame(() => setShown(value))
    return () => cancelAnimationFrame(frame)
  }, [value])
  return shown
}

/** All that the page says of a token's pairs, now and with what is tried. */
export function useTokenFindings(
  present: Evaluation | undefined,
  tried: Checked | undefined,
  token: string,
) {
  return useMemo(() => {
    if (present === undefined) return undefined
    const after = tried?.ok === true ? tried.evaluation : undefined
    const followers = followersOf(token, present.dependents)
    const follows = (id: string) => followers.has(id)
    const findings = findingsOf(present, token).map(({ finding }) => finding)
    const triedFindings = after && findingsOf(after, token).map(({ finding }) => finding)
    return {
      followers,
      findings,
      pairs: pairStandings(token, findings, triedFindings, follows),
      moved: after && movedGroups(token, consequences(present, after), follows),
    }
  }, [present, tried, token])
}
