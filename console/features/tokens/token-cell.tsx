import { type CellHalf, StripCell } from '#console/ui/strip-cell.tsx'
import type { StripBand } from '#console/ui/strip-geometry.ts'
import { DERIVED_STATES } from '#shared/checks/model.ts'
import type { TokenWire } from '#shared/contracts/tokens.contract.ts'
import type { StripThemes } from './strip-bands.ts'

/** A token's strip cell, from what the service resolved. */
export function TokenCell({
  name,
  resolved,
  shown,
  breach,
  size = 'row',
}: {
  name: string
  resolved: TokenWire['resolved']
  shown: StripThemes
  breach: StripBand['breach']
  size?: 'line' | 'row' | 'title'
}) {
  return (
    <StripCell
      size={size}
      label={`${name} in ${shown.light} and ${shown.dark}`}
      light={halfOf(resolved, shown, 'light', breach)}
      dark={halfOf(resolved, shown, 'dark', breach)}
    />
  )
}

function halfOf(
  resolved: TokenWire['resolved'],
  shown: StripThemes,
  side: 'light' | 'dark',
  breach: StripBand['breach'],
): CellHalf {
  const states = resolved[shown[side]]
  const slivers = DERIVED_STATES.flatMap((state) => {
    const color = states?.[state]
    return color === undefined ? [] : [[state, color.hex] as const]
  })
  return {
    ground: shown.grounds[side],
    rest: states?.rest.hex ?? shown.grounds[side],
    breaches: breach === side || breach === 'both',
    ...(slivers.length > 0 ? { states: Object.fromEntries(slivers) } : {}),
  }
}
