import { formatDay } from '#console/lib/format.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { truncateRatio } from '#shared/checks/finding-words.ts'
import type { BreachWire } from '#shared/contracts/breaches.contract.ts'
import { closingInWords } from './breach-words.ts'

export function BreachStatus({ breach }: { breach: BreachWire }) {
  if (breach.status === 'resolved') return <Resolved breach={breach} />
  if (breach.status === 'waived') return <OutcomeMark kind="waived">waived</OutcomeMark>
  return (
    <OutcomeMark kind="breach" calm>
      open
      {!breach.gating && <span className="text-ink-soft">, reported only</span>}
    </OutcomeMark>
  )
}

/** What closed it and when, and how low it had been. */
function Resolved({ breach }: { breach: BreachWire }) {
  return (
    <span className="block py-4 font-normal text-ink-soft">
      {closingInWords(breach)}
      <span className="figures block text-12">
        {breach.resolvedAt !== undefined && `${formatDay(breach.resolvedAt)}, `}
        lowest <span data-ratio="lowest">{truncateRatio(breach.lowestRatio, 2)}</span>
      </span>
    </span>
  )
}
