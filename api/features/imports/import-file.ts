import type { Adjustment, PairModel, State, SystemSettings } from '#shared/checks/model.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import type { PairInput } from '#shared/contracts/pairs.contract.ts'
import type { ImportNoteWire } from '#shared/contracts/import-outcome.ts'
import type { RuleScopeWire, RulesWire, ThemeRuleWire } from '#shared/contracts/rules.contract.ts'
import type { TokenWire } from '#shared/contracts/tokens.contract.ts'
import type { Remainder } from './import-remainder.rules.ts'

/**
 * What a file says of a system, whatever its format: tokens by name, themes by key. What is absent it says
 * nothing of. Pointers lead into the file.
 */
export interface ImportFile {
  readonly tokens: readonly FileToken[]
  /** Names in the order of the ledger: in the groups of a file they lie otherwise. */
  readonly ledger?: readonly string[]
  /** The base first. */
  readonly themes?: readonly FileTheme[]
  readonly pairs?: readonly FilePair[]
  readonly rules?: Pick<RulesWire, 'states' | 'prefixes'>
  readonly settings?: SystemSettings
  readonly distinctSets?: readonly FileDistinctSet[]
  readonly remainder: Remainder
  /** Written by this service: what a token does not say it does not have. */
  readonly isWhole: boolean
  readonly notes: readonly ImportNoteWire[]
  /** Derived colours that the file left as they were. */
  readonly derivedAgain: number
}

export type FileValue =
  | { readonly kind: 'color'; readonly color: Oklch }
  | { readonly kind: 'alias'; readonly name: string }
  | ({ readonly kind: 'derived'; readonly name: string } & Adjustment)

export type FileValues = { readonly [state in State]?: FileValue }

export interface FileToken {
  readonly pointer: string
  readonly id?: string
  readonly name: string
  readonly value: FileValue
  readonly states?: TokenWire['states']
  /** Overrides by theme key, then by state. */
  readonly values?: Readonly<Record<string, FileValues>>
  readonly rules?: RuleScopeWire
  readonly description?: string
  readonly deprecated?: NonNullable<TokenWire['deprecated']>
  readonly locked?: boolean
}

export interface FileTheme {
  readonly pointer: string
  readonly id?: string
  readonly key: string
  readonly name?: string
  readonly from?: string
  /** A file of another making does not tell them. */
  readonly ground?: string
  readonly ink?: string
  readonly rule?: ThemeRuleWire
  readonly level?: PairModel['level']
  readonly gating?: boolean
}

export interface FilePair {
  readonly pointer: string
  readonly id?: string
  readonly pair: PairInput
}

export interface FileDistinctSet {
  readonly pointer: string
  readonly id?: string
  readonly name: string
  readonly tokens: readonly string[]
}
