import type { Scope } from '#shared/contracts/permissions.ts'

/** What somebody may want a key for: the scopes follow from it. */
export const PURPOSES = [
  { value: 'read', text: 'fetch themes', scopes: ['themes:read'], mostDays: 365 },
  {
    value: 'check',
    text: 'check the builds of a pipeline',
    scopes: ['checks:write'],
    mostDays: 90,
  },
  {
    value: 'check-and-fetch',
    text: 'check the builds of a pipeline and fetch themes',
    scopes: ['checks:write', 'themes:read'],
    mostDays: 90,
  },
  { value: 'write', text: 'write tokens', scopes: ['tokens:write'], mostDays: 90 },
] as const satisfies readonly {
  value: string
  text: string
  scopes: readonly Scope[]
  mostDays: number
}[]
export type Purpose = (typeof PURPOSES)[number]['value']

export const SCOPE_WORDS: { readonly [scope in Scope]: string } = {
  'themes:read': 'fetches themes',
  'checks:write': 'checks',
  'tokens:write': 'writes tokens',
}

/** `checks, fetches themes` */
export const scopesInWords = (scopes: readonly Scope[]): string =>
  scopes.map((scope) => SCOPE_WORDS[scope]).join(', ')

/** The command that a key is for, ready to be run where the key stands in `DYEWRIGHT_KEY`. */
export function commandFor(
  scopes: readonly Scope[],
  { origin, system, theme }: { origin: string; system: string; theme: string },
): string {
  if (scopes.includes('checks:write')) {
    return [
      `curl -fsSO ${origin}/cli/dyewright.mjs`,
      `node dyewright.mjs gate --url ${origin} --system ${system} --tokens tokens.json`,
    ].join('\n')
  }
  const start = 'curl -fsS -H "Authorization: Bearer $DYEWRIGHT_KEY" \\'
  const address = `${origin}/v1/systems/${system}`
  return scopes.includes('tokens:write')
    ? `${start}\n  ${address}/tokens`
    : `${start}\n  -O ${address}/themes/${theme}.css`
}
