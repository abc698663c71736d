import { formatDay } from '#console/lib/format.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import type { LedgerRow } from './ledger-rows.ts'

/** How a token stands, as its mark and word; nothing where all its pairs pass. */
export function TokenMark({ row }: { row: LedgerRow }) {
  const { mark, breaches, waivedUntil } = row.standing
  const counted = breaches === 1 ? 'breach' : `${breaches} breaches`
  switch (mark) {
    case 'breach':
      return <OutcomeMark kind="breach">{counted}</OutcomeMark>
    case 'breach-on-it':
      return <OutcomeMark kind="breach">{counted} on it</OutcomeMark>
    case 'waived':
      return (
        <OutcomeMark kind="waived">
          waived{waivedUntil !== undefined && ` to ${formatDay(waivedUntil)}`}
        </OutcomeMark>
      )
    case 'exempt':
      return (
        <OutcomeMark kind="exempt">
          {row.token.states.includes('disabled') ? 'disabled exempt' : 'exempt'}
        </OutcomeMark>
      )
    default:
      return null
  }
}
