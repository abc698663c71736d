import { ROOT_TOKEN } from './dtcg-document.ts'

/**
 * Reads `{group.token}` into its segments.
 * @returns Nothing where it is no such reference: braces inside, an empty segment, a `$` other than a last `$root`.
 * @see https://www.designtokens.org/tr/2025.10/format/#alias-reference
 */
export function readAlias(text: string): string[] | undefined {
  const inner = /^\{([^{}]+)\}$/.exec(text)?.[1]
  const segments = inner?.split('.')
  const isPath = segments?.every(
    (segment, i) =>
      segment !== '' &&
      (!segment.startsWith('$') || (segment === ROOT_TOKEN && i === segments.length - 1)),
  )
  return isPath ? segments : undefined
}

const LONGEST = 4096

/**
 * Reads a JSON pointer into this document (`#/a/b`) into its segments.
 * @returns Nothing where it points into another document is badly escaped, or is longer than 4,096 characters.
 * @see https://www.rfc-editor.org/rfc/rfc6901#section-6
 */
export function readPointer(reference: unknown): string[] | undefined {
  if (typeof reference !== 'string' || !/^#(\/|$)/.test(reference)) return undefined
  if (reference.length > LONGEST || /%(?![\da-f]{2})|~(?![01])/i.test(reference)) return undefined
  try {
    return decodeURIComponent(reference.slice(1))
      .split('/')
      .slice(1)
      .map((segment) => segment.replaceAll('~1', '/').replaceAll('~0', '~'))
  } catch {
    // Escapes that are no UTF-8: as unreadable as any other bad pointer.
    return undefined
  }
}
