import { useMemo, useRef } from 'react'
import { useElementWidth, usePrinting } from '#console/ui/element-width.ts'
import { ratioPosition } from '#console/ui/ratio-scale.ts'
import { useRowWalk } from '#console/ui/row-walk.ts'
import { useNarrow } from '#console/ui/window-size.ts'
import { SheetBand } from './sheet-band.tsx'
import type { SheetBand as Band } from './sheet-bands.ts'
import { sheetLines } from './sheet-layout.ts'
import { SheetRuler } from './sheet-ruler.tsx'

/** Before it is laid out. */
const USUAL_WIDTH = 1060
/** What a printed page leaves for the ruler beside the labels. */
const PRINTED_WIDTH = 480

/** The specimen sheet: each background a band, each declared foreground at the place of its ratio. */
export function PairSheet({
  bands,
  tokenHref,
  pairHref,
}: {
  bands: readonly Band[]
  tokenHref: (name: string) => string
  pairHref: (id: string) => string
}) {
  const ruler = useRef<HTMLDivElement>(null)
  const measured = useElementWidth(ruler, USUAL_WIDTH)
  const isPrinting = usePrinting()
  const isNarrow = useNarrow()
  const width = isPrinting ? PRINTED_WIDTH : measured
  const drawn = useMemo(() => {
    const room = {
      width,
      placeOf: (ratio: number) => ratioPosition(ratio, width),
      hasNames: isPrinting,
      isStacked: isPrinting || isNarrow || width < 720,
    }
    let first = 0
    return bands.map((band) => {
      const lines = sheetLines(band.points, room)
      const start = first
      first += band.points.reduce((sum, { words }) => sum + words.length, 0)
      return { band, lines, start, isStacked: room.isStacked }
    })
  }, [bands, width, isPrinting, isNarrow])
  const count = bands.reduce(
    (sum, { points }) => sum + points.reduce((words, point) => words + point.words.length, 0),
    0,
  )
  const walk = useRowWalk(count)
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the links inside, which are operable
    <div ref={walk.container} onKeyDown={walk.onKeyDown} className="sheet">
      <SheetRuler />
      <div className="sheet-band h-0!" aria-hidden="true">
        <div className="max-wide:hidden" />
        <div ref={ruler} />
      </div>
      {drawn.map(({ band, lines, start, isStacked }) => (
        <SheetBand
          key={band.key}
          band={band}
          lines={lines}
          isStacked={isStacked}
          tokenHref={tokenHref}
          pairHref={pairHref}
          linkOf={(at) => walk.rowLink(start + at)}
        />
      ))}
    </div>
  )
}
