import {
  countOf,
  repairInWords,
  stateInWords,
  truncateRatio,
} from '#shared/checks/finding-words.ts'
import type { CheckFindingWire, CheckWire } from '#shared/contracts/checks.contract.ts'
import { sarifOf } from '#shared/formats/sarif.ts'
import { painterFor } from './paint.ts'
import { folded, plain } from './terminal-text.ts'

/** How the reader sees it: whether colour may be used, and how many columns there are. */
export interface Surface {
  readonly hasColor: boolean
  readonly columns: number
}

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)

const shortfall = ({ ratio, required }: CheckFindingWire): number => ratio / required

const groupsOf = (breaches: readonly CheckFindingWire[]): CheckFindingWire[][] => {
  const groups = new Map<string, CheckFindingWire[]>()
  for (const finding of breaches) {
    const subject = JSON.stringify([finding.foreground, finding.background, finding.use])
    groups.set(subject, [...(groups.get(subject) ?? []), finding])
  }
  const worst = (group: readonly CheckFindingWire[]) => Math.min(...group.map(shortfall))
  return [...groups.values()].sort((a, b) => worst(a) - worst(b))
}

const onSrgb = ({ srgbRatio }: CheckFindingWire): string =>
  srgbRatio === undefined ? '' : `, ${truncateRatio(srgbRatio, 4)} in sRGB`

const remarksOn = (finding: CheckFindingWire): string[] => [
  ...(finding.basis === 'p3' ? [`measured in Display P3${onSrgb(finding)}`] : []),
  ...(finding.reason ? [finding.reason.replaceAll('-', ' ')] : []),
  ...(finding.tight ? ['one level of a translucent layer would flip it'] : []),
  ...(finding.gating ? [] : ['its theme only reports']),
]

/** One edit mends most findings of a pair: it is said once. */
const repairsOf = (group: readonly CheckFindingWire[]): string[] => [
  ...new Set(group.map(repairInWords).filter((text) => text !== undefined)),
]

const MOST_THEME_COLUMNS = 10
const STATE_COLUMNS = 'disabled on active'.length

const tableOf = (
  breaches: readonly CheckFindingWire[],
  { hasColor, columns }: Surface,
): string[] => {
  const paint = painterFor(hasColor)
  const widest = Math.max(5, ...breaches.map(({ theme }) => plain(theme).length))
  const themeColumns = Math.min(MOST_THEME_COLUMNS, widest)
  const lead = (theme: string, state: string) =>
    `  ${theme.padEnd(themeColumns)}  ${state.padEnd(STATE_COLUMNS)}`
  const rowsOf = (finding: CheckFindingWire): string[] => {
    const themes = folded(plain(finding.theme), themeColumns)
    const foreground = plain(finding.rendered.foreground)
    const background = plain(finding.rendered.background)
    const measured = `${truncateRatio(finding.ratio, 4).padStart(7)}  ${`${finding.required}`.padStart(8)}`
    const sample = paint.sample(foreground, background)
    const row = `${lead(themes[0] ?? '', stateInWords(plain(finding.state)))}  ${paint.short(measured)}  ${sample}${foreground} on ${background}`
    const remarks = remarksOn(finding).map(plain).join('; ')
    return [
      row,
      ...themes.slice(1).map((rest) => `  ${rest}`),
      ...(remarks ? folded(remarks, columns - 4).map((line) => `    ${line}`) : []),
    ]
  }
  const groups = groupsOf(breaches).flatMap((group) => {
    const [first] = group
    if (!first) return []
    const name = plain(`${first.foreground} on ${first.background}, ${first.use}`)
    const heading = folded(name, columns - 2).map((line, at) =>
      paint.strong(at ? `  ${line}` : line),
    )
    const repairs = repairsOf(group).flatMap((text) => folded(plain(text), columns - 4))
    return [...heading, ...group.flatMap(rowsOf), ...repairs.map((line) => `    ${line}`)]
  })
  const head =
    `${lead('Theme', 'State')}    Ratio  Required  ${hasColor ? '     ' : ''}Colours`.trimEnd()
  return [paint.soft(head), ...groups]
}

const countsText = ({ counts }: CheckWire): string =>
  capital(
    [
      countOf(counts.breach, 'breach', 'breaches'),
      ...(counts.known > 0 ? [countOf(counts.known, 'known', 'known')] : []),
      ...(counts.waived > 0 ? [countOf(counts.waived, 'waived', 'waived')] : []),
      countOf(counts.exempt, 'exempt', 'exempt'),
      countOf(counts.pass, 'passing', 'passing'),
    ].join(', '),
  )

/** What the check left behind for its branch; nothing where it did not say which. */
const loggedText = ({ source, logged }: CheckWire): string[] => {
  if (logged === undefined) return []
  const { seen, opened, resolved } = logged
  const place = `${source?.repository}, ${source?.branch}${logged.protected ? ' (protected)' : ''}`
  const followed = [
    `${countOf(opened, 'breach', 'breaches')} opened`,
    `${countOf(resolved, 'breach', 'breaches')} resolved`,
  ]
  const isFollowed = logged.protected || opened > 0 || resolved > 0
  const said = [countOf(seen, 'sighting', 'sightings'), ...(isFollowed ? followed : [])]
  return [`Logged for ${place}: ${said.join(', ')}.`]
}

/**
 * The check as a build log shows it: verdict, a table of breaches (furthest short first), counts, engine.
 * Colour only ever doubles what the text says. Nothing from the wire reaches the terminal unstripped.
 */
export function reportOf(check: CheckWire, system: string, surface: Surface): string {
  const paint = painterFor(surface.hasColor)
  const breaches = check.findings.filter(({ outcome }) => outcome === 'breach')
  const verdict = check.verdict === 'fail' ? paint.short('fails') : 'passes'
  const { version, gamutMap, ruleSet } = check.engine
  const lines = [
    `Check ${check.number} of ${plain(system)} ${verdict}, against revision ${check.against.revision}.`,
    `${countsText(check)}.`,
    ...(breaches.length > 0 ? ['', ...tableOf(breaches, surface)] : []),
    '',
    ...(check.advisories.length > 0
      ? [
          `${capital(countOf(check.advisories.length, 'advisory', 'advisories'))} besides; the json and sarif formats list them.`,
        ]
      : []),
    ...loggedText(check).flatMap((text) => folded(plain(text), surface.columns)),
    ...folded(`Engine ${plain(version)}, ${plain(gamutMap)}, ${plain(ruleSet)}.`, surface.columns),
    'Contrast is one criterion; this is no verdict of conformity.',
  ]
  return `${lines.join('\n')}\n`
}

/** The check as the service answered it. */
export function jsonOf(check: CheckWire): string {
  return `${JSON.stringify(check, null, 2)}\n`
}

/** The check as the service would answer it to `Accept: application/sarif+json`. */
export function sarifTextOf(check: CheckWire, system: string): string {
  return `${JSON.stringify(sarifOf(check, system), null, 2)}\n`
}
