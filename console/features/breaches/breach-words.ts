import { formatDay, startSentence } from '#console/lib/format.ts'
import type { BreachEventWire, BreachWire } from '#shared/contracts/breaches.contract.ts'

const CLOSED: { readonly [reason in NonNullable<BreachWire['closingReason']>]: string } = {
  fixed: 'fixed',
  'requirement-changed': 'requirement changed',
  'pair-removed': 'pair removed',
  'theme-removed': 'theme removed',
  exempted: 'exempted',
  'engine-changed': 'engine changed',
}

/** `resolved, fixed` */
export function closingInWords(breach: BreachWire): string {
  if (breach.metBy !== undefined) return `resolved, ${standInWords(breach)}`
  return breach.closingReason === undefined
    ? 'resolved'
    : `resolved, ${CLOSED[breach.closingReason]}`
}

/** Resolved though still under its line: `met by focus.inner`, the member of its group that meets the one it has. */
function standInWords({ metBy, background }: BreachWire): string {
  if (metBy === undefined) return 'met by its group'
  return metBy.background === background
    ? `met by ${metBy.foreground}`
    : `met by ${metBy.foreground} on ${metBy.background}`
}

/** `27 Nov, r212` */
export function firstSeenInWords(breach: BreachWire): string {
  const day = formatDay(breach.firstSeenAt)
  return breach.firstSeenRevision === undefined ? day : `${day}, r${breach.firstSeenRevision}`
}

/** Where it was seen, beside the head: `larkhaven/timetable, main`. */
export function originInWords(breach: BreachWire): string {
  if (breach.origin === 'head') return 'on the head'
  return [breach.repository, breach.branch].filter((part) => part !== undefined).join(', ')
}

/** What is out of the ordinary about where or how it was measured; nothing for sRGB on the head. */
export function asideInWords(breach: BreachWire): string | undefined {
  const parts = [
    breach.origin === 'ci' ? `seen in ${originInWords(breach)}` : undefined,
    breach.basis === 'p3' ? 'short in Display P3, outside WCAG’s definition' : undefined,
  ].filter((part) => part !== undefined)
  return parts.length === 0 ? undefined : parts.join('; ')
}

/** How the last measured ratio is to be read. */
export function outcomeOf({ status }: BreachWire) {
  return status === 'open' ? 'breach' : status === 'waived' ? 'waived' : 'pass'
}

const EVENTS: { readonly [kind in BreachEventWire['kind']]: string } = {
  opened: 'Fell short',
  worsened: 'Fell further',
  eased: 'Came nearer',
  resolved: 'Passed again',
  reopened: 'Fell short again',
  assigned: 'Assigned',
  unassigned: 'Taken off',
  commented: 'Commented',
}

/** Whether a check made it: what people make of a breach leaves its measures as they are. */
export function isMeasured({ kind }: BreachEventWire): boolean {
  return kind !== 'assigned' && kind !== 'unassigned' && kind !== 'commented'
}

export function eventInWords(event: BreachEventWire, breach: BreachWire): string {
  const person = event.assignee?.name ?? 'somebody'
  if (event.kind === 'assigned') return `Assigned to ${person}`
  if (event.kind === 'unassigned') return `Taken off ${person}`
  if (event.kind === 'resolved' && event.ratio < event.required && breach.metBy !== undefined) {
    return startSentence(standInWords(breach))
  }
  const closed = event.kind === 'resolved' && breach.closingReason
  return closed && closed !== 'fixed' ? `Closed, ${CLOSED[closed]}` : EVENTS[event.kind]
}
