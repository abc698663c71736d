import { AppError } from '#api/errors.ts'

/**
 * Answers the parameters of a query; one that is repeated is a list.
 * @param search what follows the question mark
 * @throws {AppError} `parameter-invalid` where percent-encoding is broken or is not UTF-8
 * @see https://url.spec.whatwg.org/#application/x-www-form-urlencoded
 */
export function parseQuery(search: string): Record<string, string | string[]> {
  const found = new Map<string, string[]>()
  for (const part of search.split('&')) {
    if (part === '') continue
    const split = part.indexOf('=')
    const name = decode(split < 0 ? part : part.slice(0, split), 'query')
    const value = split < 0 ? '' : decode(part.slice(split + 1), name)
    found.set(name, [...(found.get(name) ?? []), value])
  }
  return Object.fromEntries(
    [...found].map(([name, values]) => [name, values.length === 1 ? (values[0] ?? '') : values]),
  )
}

function decode(text: string, parameter: string): string {
  try {
    return decodeURIComponent(text.replaceAll('+', ' '))
  } catch {
    throw new AppError('parameter-invalid', {
      faults: [{ parameter, detail: 'Its percent-encoding cannot be read' }],
    })
  }
}
