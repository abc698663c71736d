import type { ItemEdits, SystemEdits } from './edits.ts'
import type { SystemModel, ThemeModel, ThemeRule, TokenModel } from './model.ts'

/** That a token is going away; the replacement by id, so that a rename moves nothing. */
export interface Deprecation {
  readonly reason?: string
  readonly replacement?: string
  /** Calendar date, `YYYY-MM-DD`. */
  readonly sunset?: string
}

/** A token with what a revision governs beyond the engine's part. */
export interface GovernedToken extends TokenModel {
  readonly description?: string
  readonly locked: boolean
  readonly deprecated?: Deprecation
}

/** A theme with what a revision governs beyond the engine's part. */
export interface GovernedTheme extends ThemeModel {
  readonly name: string
  readonly rule: ThemeRule
}

/** A system at one revision, whole; the engine takes it as it is. */
export interface GovernedSystem extends SystemModel {
  readonly themes: readonly GovernedTheme[]
  readonly tokens: readonly GovernedToken[]
}

/** Edits of a governed system. */
export interface GovernedEdits extends SystemEdits {
  readonly tokens?: ItemEdits<GovernedToken>
  readonly themes?: readonly GovernedTheme[]
}
