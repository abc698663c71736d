import { useCallback, useMemo } from 'react'
import { StripCell } from '#console/ui/strip-cell.tsx'
import { useStripBands } from './system-frame.tsx'

/** A token's cell by its name, at rest and without marks: which colour it is. */
export function useTokenCells(system: string) {
  const { shown, bands } = useStripBands(system)
  const byName = useMemo(() => new Map(bands.map((band) => [band.name, band])), [bands])
  return useCallback(
    (name: string) => {
      const band = byName.get(name)
      return shown === undefined || band === undefined ? null : (
        <StripCell
          label={`${name} in ${shown.light} and ${shown.dark}`}
          light={{ ground: shown.grounds.light, rest: band.light }}
          dark={{ ground: shown.grounds.dark, rest: band.dark }}
        />
      )
    },
    [byName, shown],
  )
}
