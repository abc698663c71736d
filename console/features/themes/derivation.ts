import type { ThemeWire } from '#shared/contracts/themes.contract.ts'

/** A theme among those it derives from: the base has depth 0. */
export interface DerivedTheme {
  readonly theme: ThemeWire
  readonly depth: number
}

/** The themes in order of derivation: each under its parent, siblings in their own order. */
export function derivationOrder(themes: readonly ThemeWire[]): DerivedTheme[] {
  const below = (parent: ThemeWire, depth: number): DerivedTheme[] => [
    { theme: parent, depth },
    ...themes.filter(({ from }) => from === parent.key).flatMap((child) => below(child, depth + 1)),
  ]
  return themes.filter(({ from }) => from === undefined).flatMap((base) => below(base, 0))
}

/** Keys that a theme may derive from: any but itself and what derives from it. */
export function possibleParents(themes: readonly ThemeWire[], key: string): string[] {
  const own = new Set([key])
  for (const { theme } of derivationOrder(themes)) {
    if (theme.from !== undefined && own.has(theme.from)) own.add(theme.key)
  }
  return themes.map((theme) => theme.key).filter((each) => !own.has(each))
}
