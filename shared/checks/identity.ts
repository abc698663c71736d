import type { ContrastKind, State } from './model.ts'

/** What makes a finding the same finding from one check to the next. Everything by id. */
export interface FindingSubject {
  readonly foreground: string
  readonly background: string
  /** The pair's backdrop, bottom first; an empty one stands for the ground. */
  readonly backdrop: readonly string[] | 'unknown'
  /** The theme's ground. */
  readonly ground: string
  readonly kind: ContrastKind
  readonly theme: string
  readonly foregroundState: State
  readonly backgroundState: State
}

/** Our own ids hold none of these; an id that does is written so that no two subjects read alike. */
const SEPARATORS = /[%/+?]/g

function written(id: string): string {
  return id.replace(SEPARATORS, encodeURIComponent)
}

/** What all findings of a pair in one theme share of their identity: all of it but the states. */
export function identityInTheme(
  subject: Omit<FindingSubject, 'foregroundState' | 'backgroundState'>,
): string {
  const { foreground, background, backdrop, ground, kind, theme } = subject
  const under =
    backdrop === 'unknown'
      ? '?'
      : (backdrop.length === 0 ? [ground] : backdrop).map(written).join('+')
  return `${written(foreground)}/${written(background)}/${under}/${kind}/${written(theme)}`
}

/**
 * The identity of a finding as printable text,
 * `foreground/background/backdrop+…/kind/theme/foregroundState/backgroundState`: an unknown backdrop is `?`, the
 * default one the ground. It serves as the fingerprint, and is stable over renames and thresholds.
 */
export function identityOf(subject: FindingSubject): string {
  return `${identityInTheme(subject)}/${subject.foregroundState}/${subject.backgroundState}`
}
