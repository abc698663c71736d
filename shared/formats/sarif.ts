import type { Basis } from '#shared/checks/layers.ts'
import type { Advisory, EngineStamp, Outcome } from '#shared/checks/model.ts'
import {
  type RepairAnswer,
  repairInWords,
  stateInWords,
  truncateRatio,
} from '#shared/checks/finding-words.ts'
import type {
  SarifKind,
  SarifLevel,
  SarifLocation,
  SarifLog,
  SarifMessage,
  SarifResult,
  SarifSuppression,
} from './sarif-log.ts'
import { CAUTION, type Ruled, ruleIdOf, SARIF_RULES } from './sarif-rules.ts'

interface CheckedFinding extends Ruled, RepairAnswer {
  readonly foreground: string
  readonly background: string
  readonly theme: string
  readonly state: string
  readonly basis: Basis
  readonly tight?: boolean | undefined
  readonly gating: boolean
  readonly rendered: { readonly foreground: string; readonly background: string }
  readonly waiver?: { readonly id: string; readonly endsAt: string } | undefined
  readonly fingerprint: string
}

/** A check as it is answered, tokens and themes by name. */
export interface SarifCheck {
  readonly number: number
  readonly engine: EngineStamp
  readonly findings: readonly CheckedFinding[]
  readonly advisories: readonly {
    readonly code: Advisory['code']
    readonly token: string
    readonly theme?: string | undefined
    readonly state?: string | undefined
  }[]
}

const SCHEMA =
  'https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/schemas/sarif-schema-2.1.0.json'

const RULE_INDEX = new Map(SARIF_RULES.map(({ id }, index) => [id, index]))

const ruled = (ruleId: string) => ({ ruleId, ruleIndex: RULE_INDEX.get(ruleId)! })

/** A name can neither ask for an argument nor make a link. @see SARIF 2.1.0, 3.11.5, 3.11.6 */
const messageOf = (text: string): SarifMessage => ({
  text: text.replace(/[{}]/g, '$&$&').replaceAll('](', '\\]('),
})

const locationOf = (token: string, message?: string): SarifLocation => ({
  logicalLocations: [{ fullyQualifiedName: token, kind: 'property' }],
  ...(message === undefined ? {} : { message: { text: message } }),
})

/** Where WCAG or the system asks for nothing the kind says so, and only a failure has a level. */
const KINDS: Readonly<Record<Outcome, SarifKind>> = {
  breach: 'fail',
  waived: 'fail',
  known: 'fail',
  exempt: 'notApplicable',
  pass: 'pass',
}

const levelOf = ({ outcome, gating }: CheckedFinding): SarifLevel => {
  if (KINDS[outcome] !== 'fail') return 'none'
  if (outcome === 'known') return 'note'
  return gating ? 'error' : 'warning'
}

const OUTCOME_TEXT: Readonly<Partial<Record<Outcome, string>>> = {
  known: 'What it was compared with breaches as well, by no less.',
  exempt: 'It is exempt.',
}

const remarksOn = (finding: CheckedFinding): string[] => {
  const { outcome, basis, srgbRatio, reason, tight, gating, waiver } = finding
  const said = OUTCOME_TEXT[outcome]
  const repair = repairInWords(finding)
  return [
    ...(said === undefined ? [] : [said]),
    ...(waiver === undefined ? [] : [`A waiver allows it until ${waiver.endsAt}.`]),
    ...(basis === 'p3' ? ["WCAG's ratio on P3 luminance, outside its definition."] : []),
    ...(srgbRatio === undefined
      ? []
      : [`By WCAG's own measure, on sRGB, it is ${truncateRatio(srgbRatio, 4)}:1.`]),
    ...(reason === undefined ? [] : [`Reason: ${reason.replaceAll('-', ' ')}.`]),
    ...(tight ? ['One level of a translucent layer would flip it.'] : []),
    ...(gating ? [] : ['Its theme only reports.']),
    ...(repair === undefined ? [] : [`${repair.charAt(0).toUpperCase()}${repair.slice(1)}.`]),
  ]
}

const textOf = (finding: CheckedFinding): string => {
  const { foreground, background, use, theme, state, ratio, required } = finding
  const wanted = required > 0 ? `${required}:1 is required` : 'nothing is required'
  const measured = `${foreground} on ${background} (${use}) is ${truncateRatio(ratio, 4)}:1 in ${theme}, ${stateInWords(state)}; ${wanted}.`
  return [measured, ...remarksOn(finding)].join(' ')
}

/** Of a run all results say whether they are suppressed, or none does. @see SARIF 2.1.0, 3.27.23 */
const NOT_SUPPRESSED: readonly SarifSuppression[] = []

const suppressionsOf = ({ outcome, waiver }: CheckedFinding): readonly SarifSuppression[] => {
  if (outcome !== 'waived') return NOT_SUPPRESSED
  const why =
    waiver === undefined ? {} : { justification: `Waiver ${waiver.id}, until ${waiver.endsAt}` }
  return [{ kind: 'external', status: 'accepted', ...why }]
}

const resultOf = (finding: CheckedFinding): SarifResult => {
  const { foreground, background, fingerprint, ...measured } = finding
  return {
    ...ruled(ruleIdOf(finding)),
    kind: KINDS[finding.outcome],
    level: levelOf(finding),
    message: messageOf(textOf(finding)),
    locations: [locationOf(foreground)],
    relatedLocations: [locationOf(background, 'The background')],
    partialFingerprints: { 'findingIdentity/v1': fingerprint },
    suppressions: suppressionsOf(finding),
    properties: measured,
  }
}

const advisoryResult = (advisory: SarifCheck['advisories'][number]): SarifResult => {
  const { code, token, theme, state } = advisory
  const place = [theme, state].filter((part) => part !== undefined).join(', ')
  const { text } = SARIF_RULES[RULE_INDEX.get(code)!]!.shortDescription
  return {
    ...ruled(code),
    kind: 'informational',
    level: 'none',
    message: messageOf(`${token}${place === '' ? '' : ` in ${place}`}: ${text}`),
    locations: [locationOf(token)],
    suppressions: NOT_SUPPRESSED,
    properties: { ...(theme === undefined ? {} : { theme }), ...(state ? { state } : {}) },
  }
}

/**
 * A check as a SARIF 2.1.0 log of one run: a failure is an error (a warning where its theme only reports), a
 * known one a note, a waived one suppressed, an exempt one not applicable; advisories are informational.
 * Tokens are logical locations, since a check knows no files; ratios in messages are cut to four decimals.
 * @param check tokens and themes by name; whatever else it says of itself becomes the run's properties
 * @param system the design system's key, which tells its runs from others'
 * @see https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/sarif-v2.1.0-errata01-os.html
 */
export function sarifOf(check: SarifCheck, system: string): SarifLog {
  const { findings, advisories, ...summary } = check
  return {
    $schema: SCHEMA,
    version: '2.1.0',
    runs: [
      {
        tool: {
          driver: {
            name: 'Dyewright',
            version: check.engine.version,
            fullDescription: {
              text: `Measures declared pairs of colour tokens against WCAG 2.x. ${CAUTION}`,
            },
            rules: SARIF_RULES,
          },
        },
        automationDetails: { id: `dyewright/${system}/${check.number}` },
        results: [...findings.map(resultOf), ...advisories.map(advisoryResult)],
        properties: { ...summary },
      },
    ],
  }
}
