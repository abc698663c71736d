import type { CellHalf } from '#console/ui/strip-cell.tsx'
import { DERIVED_STATES } from '#shared/checks/model.ts'
import { relativeLuminance } from '#shared/color/luminance.ts'
import type { ImportChangeWire, ImportWire } from '#shared/contracts/import-outcome.ts'

type Side = 'before' | 'after'
type Half = 'light' | 'dark'
type Finding = ImportWire['check']['findings'][number]

/** The two halves of a cell, and the themes that they show. */
export interface ChangeCell {
  readonly light: CellHalf
  readonly dark: CellHalf
  readonly themes: { readonly [half in Half]: string }
}

/** How the tokens of an import are seen before and after it. */
export interface ChangeCells {
  readonly of: (change: ImportChangeWire, side: Side) => ChangeCell | undefined
}

/**
 * Reads the cells out of an import's answer.
 * @param halfOf the half that a theme of neither ground cuts when it breaches
 */
export function changeCells(
  { grounds, effect, check }: ImportWire,
  halfOf: (theme: string) => Half,
): ChangeCells {
  const after = check.findings.filter(({ outcome }) => outcome === 'breach')
  const opened = new Set(effect.opened.map(({ fingerprint }) => fingerprint))
  const before = [
    ...effect.resolved,
    ...after.filter(({ fingerprint }) => !opened.has(fingerprint)),
  ]
  const sides = {
    before: { shown: shownThemes(grounds.before), cut: cutsIn(before, grounds.before, halfOf) },
    after: { shown: shownThemes(grounds.after), cut: cutsIn(after, grounds.after, halfOf) },
  }
  return {
    of: (change, side) => {
      const { shown, cut } = sides[side]
      const colors = change.colors?.[side]
      if (shown === undefined || colors === undefined) return undefined
      const cuts = cut.get(nameOn(change, side))
      const half = (at: Half): CellHalf => {
        const { rest = grounds[side][shown[at]] ?? '', ...states } = colors[shown[at]] ?? {}
        const slivers = DERIVED_STATES.flatMap((state) => {
          const hex = states[state]
          return hex === undefined ? [] : [[state, hex] as const]
        })
        return {
          ground: grounds[side][shown[at]] ?? '',
          rest,
          breaches: cuts?.has(at) === true,
          ...(slivers.length > 0 ? { states: Object.fromEntries(slivers) } : {}),
        }
      }
      return { light: half('light'), dark: half('dark'), themes: shown }
    },
  }
}

/** A renamed token goes by its old name before. */
function nameOn({ name, before }: ImportChangeWire, side: Side): string {
  return side === 'before' && typeof before?.name === 'string' ? before.name : name
}

/** The theme on the lighter ground stands left; one alone stands on both sides. */
function shownThemes(grounds: Readonly<Record<string, string>>): Record<Half, string> | undefined {
  const [first, second = first] = Object.keys(grounds)
  if (first === undefined || second === undefined) return undefined
  return luminanceOf(grounds[first]) >= luminanceOf(grounds[second])
    ? { light: first, dark: second }
    : { light: second, dark: first }
}

function luminanceOf(hex = '#000000'): number {
  const byte = (at: number) => Number.parseInt(hex.slice(at, at + 2), 16)
  return relativeLuminance(byte(1), byte(3), byte(5))
}

/** By token name, the halves that a breach cuts. */
function cutsIn(
  breaches: readonly Finding[],
  grounds: Readonly<Record<string, string>>,
  halfOf: (theme: string) => Half,
): Map<string, Set<Half>> {
  const shown = shownThemes(grounds)
  const cuts = new Map<string, Set<Half>>()
  for (const { foreground, background, theme } of breaches) {
    const half = theme === shown?.light ? 'light' : theme === shown?.dark ? 'dark' : halfOf(theme)
    for (const name of [foreground, background]) {
      cuts.set(name, (cuts.get(name) ?? new Set()).add(half))
    }
  }
  return cuts
}
