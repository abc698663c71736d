import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { sha256Hex } from './sha256.ts'
import { AppError } from './errors.ts'

/** What an `If-Match` field asks for. */
export interface IfMatch {
  /** Whether the edit is meant for the representation with this strong validator. */
  matches(etag: string): boolean
}

/** Answers a strong validator, quotes included, that differs whenever the representation does. */
export const etagOf = (representation: unknown): string =>
  `"${sha256Hex(canonicalJson(representation)).slice(0, 32)}"`

/** It has changed since the caller read it: the answer carries what it is now. */
export const preconditionFailed = (current: unknown): AppError =>
  new AppError('precondition-failed', {
    detail: 'Read it again; `current` is how it stands now',
    extra: { current },
  })
