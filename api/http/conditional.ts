import { AppError } from '#api/errors.ts'
import type { IfMatch } from '#api/precondition.ts'

const STRONG = /(?:W\/)?"[\x21\x23-\x7e\x80-\uffff]*"/g

const tagsIn = (field: string): string[] => field.match(STRONG) ?? []

/**
 * An `If-Match` field: strong comparison, a list of tags or `*`. An `If-None-Match` beside it holds as well, and is
 * evaluated after it.
 * @see https://www.rfc-editor.org/rfc/rfc9110#section-13.2.2
 */
export function readIfMatch(
  field: string | undefined,
  ifNoneMatch: string | undefined,
): IfMatch | undefined {
  if (field === undefined) return undefined
  const isAny = field.trim() === '*'
  const tags = tagsIn(field).filter((tag) => !tag.startsWith('W/'))
  return {
    matches: (etag) => (isAny || tags.includes(etag)) && !isUnmodified(ifNoneMatch, etag),
  }
}

/**
 * Whether `If-None-Match` already names the representation: weak comparison.
 * @see https://www.rfc-editor.org/rfc/rfc9110#section-13.1.2
 */
export function isUnmodified(field: string | undefined, etag: string): boolean {
  if (field === undefined) return false
  if (field.trim() === '*') return true
  return tagsIn(field).some((tag) => tag.replace(/^W\//, '') === etag)
}

/** A write that must say which version it is meant for, and does not. */
export const preconditionMissing = (canCreate: boolean): AppError =>
  new AppError('precondition-required', {
    detail: canCreate
      ? 'Send If-None-Match: * to create, or If-Match with the ETag you have read'
      : 'Send If-Match with the ETag you have read',
    faults: [{ parameter: 'If-Match', detail: 'Missing' }],
  })
