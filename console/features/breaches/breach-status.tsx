import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import { closingInWords } from './breach-words.ts'

export function BreachStatus({ breach }: { breach: BreachWire }) {
  if (breach.status === 'resolved') {
    return <span className="text-ink-soft">{closingInWords(breach)}</span>
  }
  if (breach.status === 'waived') return <OutcomeMark kind="waived">waived</OutcomeMark>
  return (
    <OutcomeMark kind="breach" calm>
      open
      {!breach.gating && <span className="text-ink-soft">, reported only</span>}
    </OutcomeMark>
  )
}
