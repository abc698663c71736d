import type { BreachEventWire } from '#shared/contracts/breaches.contract.ts'
import type { FindingWire } from '#shared/contracts/findings.ts'
import type { MeasuredHead } from './measured-head.ts'
import type { ScreenRatio } from './screen-ratios.ts'

/** What the API says, to hold a page against. */
export interface Answers {
  readonly head: MeasuredHead
  /** The theme that the token table is measured in; all of them where absent. */
  readonly theme?: string
  /** The opened token's name. */
  readonly token?: string
  /** Findings with what is tried laid over the head. */
  readonly tried?: readonly FindingWire[]
  /** Of the opened breach, oldest first. */
  readonly events?: readonly BreachEventWire[]
}

/** A ratio as the screen should have it. */
export interface Figures {
  readonly text: string
  readonly required: string
  readonly before?: string | undefined
}

/**
 * The figures of the finding that a ratio on screen claims to be of, from the API's JSON.
 * @throws {Error} where the API has no such finding, or more than one that differ
 */
export function claimedFigures(shown: ScreenRatio, answers: Answers): Figures {
  switch (shown.place) {
    case 'tokens':
      return ofToken(shown, answers)
    case 'pairs':
      return ofPair(shown, answers)
    case 'moves':
      return ofMove(shown, answers)
    case 'ships':
      return ofShipped(shown, answers)
    case 'breaches':
      return ofBreach(shown, answers)
    case 'history':
      return ofEvent(shown, answers)
    case 'steps':
      return ofStep(shown, answers)
  }
}

/** Two decimals, cut: as a person may rely on. */
export function cut(ratio: number): string {
  const [, whole = '', fraction = ''] = /^(\d+)(?:\.(\d+))?$/.exec(String(ratio)) ?? []
  return `${whole}.${`${fraction}00`.slice(0, 2)}`
}

function figuresOf({ ratio, required }: { ratio: number; required: number }): Figures {
  return { text: cut(ratio), required: required === 0 ? '' : `of ${required}` }
}

/** `hover on rest` is hover/rest, `rest` is rest/rest. */
function stateIn(words: string): string {
  const [foreground = '', background = foreground] = words.split(' on ')
  return `${foreground}/${background}`
}

function stateWords(state: string): string {
  const [foreground = '', background = ''] = state.split('/')
  return foreground === background ? foreground : `${foreground} on ${background}`
}

function fail(shown: ScreenRatio, reason: string): never {
  throw new Error(`${reason}: ${JSON.stringify(shown)}`)
}

/** Findings that fit, where all of them measure the same. */
function one(shown: ScreenRatio, found: readonly FindingWire[]): FindingWire {
  const [first] = found
  if (first === undefined) fail(shown, 'the API has no such finding')
  if (found.some(({ ratio }) => ratio !== first.ratio)) fail(shown, 'the claim is not of one ratio')
  return first
}

function ofToken(shown: ScreenRatio, { head, theme }: Answers): Figures {
  const lowest =
    theme === undefined
      ? head.tokens.get(shown.label)?.standing.lowest
      : lowestOf(findingsOn(head.findings, shown.label, theme))
  if (lowest == null) fail(shown, 'the API measures nothing of this token')
  const claimed = head.findings.filter((finding) => {
    const isItsOwn = finding.foreground === shown.label || finding.background === shown.label
    const where = `${finding.theme}, ${stateWords(finding.state)}`
    const isSame = finding.ratio === lowest.ratio && finding.required === lowest.required
    return isItsOwn && isSame && shown.parts.some((part) => part.endsWith(where))
  })
  return figuresOf(one(shown, claimed))
}

/** Findings of one theme with the token on either side. */
export function findingsOn(findings: readonly FindingWire[], token: string, theme: string) {
  return findings.filter(
    (finding) =>
      finding.theme === theme && (finding.foreground === token || finding.background === token),
  )
}

interface Relation {
  readonly foreground: string
  readonly background: string
  readonly rest: string
}

/** `as text.link, on surface.hull …`: which pair a phrase of the opened token's page names. */
function relationIn(shown: ScreenRatio, token: string): Relation {
  const phrase = shown.parts.find((part) => /^(as|on|under) /.test(part)) ?? ''
  const [, through, word, other = '', rest = ''] =
    /^(?:as (\S+), )?(on|under) (\S+) (.*)$/.exec(phrase) ?? fail(shown, 'no phrase names its pair')
  const own = through ?? token
  return word === 'on'
    ? { foreground: own, background: other, rest }
    : { foreground: other, background: own, rest }
}

function ofPair(shown: ScreenRatio, { head, token = '', tried }: Answers): Figures {
  const { foreground, background, rest } = relationIn(shown, token)
  const [, use, theme, states = ''] =
    /^(\S+), lowest in (\S+), (.*)$/.exec(rest) ?? fail(shown, 'the words do not say where')
  const ofThisPair = (findings: readonly FindingWire[]) =>
    findings.filter(
      (finding) =>
        finding.foreground === foreground &&
        finding.background === background &&
        finding.use === use,
    )
  const now = ofThisPair(tried ?? head.findings)
  const claimed = now.filter(
    (finding) => finding.theme === theme && finding.state === stateIn(states),
  )
  const lowest = one(shown, claimed)
  if (lowestOf(now).ratio !== lowest.ratio) fail(shown, 'another finding of the pair is lower')
  return {
    ...figuresOf(lowest),
    before: tried && cut(lowestOf(ofThisPair(head.findings)).ratio),
  }
}

function ofMove(shown: ScreenRatio, { head, token = '', tried = [] }: Answers): Figures {
  const { foreground, background, rest } = relationIn(shown, token)
  const [theme = '', ...states] = rest.split(/, | and /)
  const required = Number(shown.required.slice(3))
  const claimed = (findings: readonly FindingWire[]) =>
    states.flatMap((words) => {
      const found = findings.filter(
        (finding) =>
          finding.foreground === foreground &&
          finding.background === background &&
          finding.theme === theme &&
          finding.state === stateIn(words) &&
          finding.required === required,
      )
      if (found.length === 0) fail(shown, `the API has no finding of ${words}`)
      return found
    })
  return {
    ...figuresOf(one(shown, claimed(tried))),
    before: cut(one(shown, claimed(head.findings)).ratio),
  }
}

function ofShipped(shown: ScreenRatio, { head, token = '' }: Answers): Figures {
  const theme = shown.group
  const state = shown.parts.find((part) => /^(rest|hover|active|focus|disabled)$/.test(part)) ?? ''
  const lowest = lowestOf(
    head.findings.filter((finding) => {
      const [foreground, background] = finding.state.split('/')
      const isOwn =
        (finding.foreground === token && foreground === state) ||
        (finding.background === token && background === state)
      return isOwn && finding.theme === theme
    }),
  )
  return figuresOf(lowest.outcome === 'exempt' ? { ...lowest, required: 0 } : lowest)
}

/** Furthest short; what requires nothing, is exempt or passes by its group only where there is no other. */
function lowestOf(findings: readonly FindingWire[]): FindingWire {
  const counting = findings.filter(
    ({ outcome, ratio, required }) =>
      outcome !== 'exempt' && required > 0 && (outcome !== 'pass' || ratio >= required),
  )
  const reach = ({ ratio, required }: FindingWire) =>
    counting.length > 0 ? ratio / required : ratio
  const [first, ...others] = counting.length > 0 ? counting : findings
  if (first === undefined) throw new Error('the API has no finding at all')
  return others.reduce((lowest, next) => (reach(next) < reach(lowest) ? next : lowest), first)
}

function ofBreach(shown: ScreenRatio, { head }: Answers): Figures {
  const breach = head.breaches.find(
    ({ number, foreground, background }) =>
      shown.label === `Breach ${number}: ${foreground} on ${background}`,
  )
  if (breach === undefined) fail(shown, 'the API has no such breach')
  const where = `${breach.theme}, ${stateWords(breach.state)}`
  if (!shown.parts.join(' ').includes(where)) fail(shown, `the row does not say ${where}`)
  return figuresOf(breach)
}

/** The history runs from the newest event to the oldest; what people did to the breach has no ratio of its own. */
function ofEvent(shown: ScreenRatio, { events = [] }: Answers): Figures {
  const measured = events.filter(({ kind }) => !/^(un)?assigned$|^commented$/.test(kind))
  const event = measured.at(-1 - shown.index)
  if (event === undefined) fail(shown, 'the API has no such event')
  const revision = event.revision === undefined ? '' : ` in revision ${event.revision}`
  if (!shown.parts.join(' ').includes(revision)) fail(shown, `the event does not say${revision}`)
  return figuresOf(event)
}

/** Steps leave out figures that would touch: each is of an event, in the order of events. */
function ofStep(shown: ScreenRatio, { events = [] }: Answers): Figures {
  const event = events.slice(shown.index).find(({ ratio }) => cut(ratio) === shown.text)
  if (event === undefined) fail(shown, 'no event has this ratio')
  return { text: cut(event.ratio), required: '' }
}
