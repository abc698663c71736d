import { useEffect, useState } from 'react'
import { bandOf, leaderPath, type PlacedBand } from './strip-geometry.ts'

/** What the leader runs to: the row or title of a token. */
export interface LeaderTarget {
  readonly name: string
  readonly element: Element
}

/** Spans the bands whose rows are in view. */
export function Bracket({
  bands,
  view,
}: {
  bands: readonly PlacedBand[]
  view: readonly [first: string, last: string]
}) {
  const first = bandOf(bands, view[0])
  const last = bandOf(bands, view[1])
  if (first === undefined || last === undefined) return null
  const top = Math.max(first.top, 0.75)
  const bottom = last.top + last.high
  return (
    <Gutter height={bottom + 2}>
      <path
        d={`M75 ${top}h6V${bottom}h-6`}
        fill="none"
        strokeWidth="1.5"
        className="mark-ring stroke-ink"
      />
    </Gutter>
  )
}

/** Runs from a band to what stands for it on the page; follows without easing, leaves when that is out of view. */
export function Leader({
  band,
  target,
  height,
}: {
  band: PlacedBand
  target: LeaderTarget
  height: number
}) {
  const place = useMiddleOf(target.element)
  if (place === undefined || place < 0 || place > height) return null
  return (
    <Gutter height={height}>
      <path
        d={leaderPath(band.top + band.high / 2, place)}
        fill="none"
        strokeWidth="2"
        className="mark-ring stroke-woad"
      />
    </Gutter>
  )
}

function Gutter({ height, children }: { height: number; children: React.ReactNode }) {
  return (
    <svg width="116" height={height} aria-hidden="true" className="absolute top-0 left-0">
      {children}
    </svg>
  )
}

/** Middle of an element in the window, px, kept true while the page scrolls or is laid out anew. */
function useMiddleOf(element: Element): number | undefined {
  const [middle, setMiddle] = useState<number>()
  useEffect(() => {
    const measure = () => {
      const box = element.getBoundingClientRect()
      setMiddle(element.isConnected ? Math.round(box.top + box.height / 2) : undefined)
    }
    measure()
    const observer = new ResizeObserver(measure)
    observer.observe(document.body)
    window.addEventListener('scroll', measure, { passive: true })
    window.addEventListener('resize', measure)
    return () => {
      observer.disconnect()
      window.removeEventListener('scroll', measure)
      window.removeEventListener('resize', measure)
    }
  }, [element])
  return middle
}

const TAG_HEIGHT = 26

/** The name of the band under pointer or focus, on the page's own colour. */
export function NameTag({ band, height }: { band: PlacedBand; height: number }) {
  const middle = band.top + band.high / 2
  const top = Math.min(Math.max(middle - TAG_HEIGHT / 2, 4), height - TAG_HEIGHT - 4)
  return (
    <span
      style={{ top }}
      aria-hidden="true"
      className="absolute left-34 wide:left-78 flex h-26 items-center border border-edge bg-ground px-8 text-12 font-medium whitespace-nowrap text-ink"
    >
      {band.name}
    </span>
  )
}
