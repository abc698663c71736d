/**
 * The members of a SARIF log that a check needs, as the standard names them.
 * @see https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/sarif-v2.1.0-errata01-os.html
 */
export interface SarifLog {
  readonly $schema: string
  readonly version: '2.1.0'
  readonly runs: readonly SarifRun[]
}

/** Anything a producer adds of its own. @see SARIF 2.1.0, 3.8 */
export type SarifProperties = Readonly<Record<string, unknown>>

/** Plain text, braces doubled. @see SARIF 2.1.0, 3.11 */
export interface SarifMessage {
  readonly text: string
}

/** `none` with any kind but `fail`. @see SARIF 2.1.0, 3.27.10 */
export type SarifLevel = 'none' | 'note' | 'warning' | 'error'

/** @see SARIF 2.1.0, 3.27.9 */
export type SarifKind = 'notApplicable' | 'pass' | 'fail' | 'informational'

/** @see SARIF 2.1.0, 3.49 */
export interface SarifRule {
  readonly id: string
  readonly name: string
  readonly shortDescription: SarifMessage
  readonly help: SarifMessage
  readonly helpUri?: string
  readonly defaultConfiguration: { readonly level: SarifLevel }
}

/** A place that has a name and no file. @see SARIF 2.1.0, 3.28, 3.33 */
export interface SarifLocation {
  readonly logicalLocations: readonly [
    { readonly fullyQualifiedName: string; readonly kind: 'property' },
  ]
  readonly message?: SarifMessage
}

/** @see SARIF 2.1.0, 3.35 */
export interface SarifSuppression {
  readonly kind: 'external'
  readonly status: 'accepted'
  readonly justification?: string
}

/** @see SARIF 2.1.0, 3.27 */
export interface SarifResult {
  readonly ruleId: string
  readonly ruleIndex: number
  readonly kind: SarifKind
  readonly level: SarifLevel
  readonly message: SarifMessage
  readonly locations: readonly SarifLocation[]
  readonly relatedLocations?: readonly SarifLocation[]
  readonly partialFingerprints?: Readonly<Record<string, string>>
  readonly suppressions: readonly SarifSuppression[]
  readonly properties: SarifProperties
}

/** @see SARIF 2.1.0, 3.14 */
export interface SarifRun {
  readonly tool: {
    readonly driver: {
      readonly name: string
      readonly version: string
      readonly fullDescription: SarifMessage
      readonly rules: readonly SarifRule[]
    }
  }
  readonly automationDetails: { readonly id: string }
  readonly results: readonly SarifResult[]
  readonly properties: SarifProperties
}
