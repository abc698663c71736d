import { type KeyboardEvent, useRef, useState } from 'react'
import { Link } from 'react-router-dom'
import { StripCloth, type StripGrounds } from './strip-cloth.tsx'
import { Bracket, Leader, type LeaderTarget, NameTag } from './strip-gutter.tsx'
import { bandOf, type PlacedBand, placeBands, type StripBand } from './strip-geometry.ts'
import { useNarrow, useWindowHeight } from './window-size.ts'

export interface StripProps {
  readonly groups: readonly (readonly StripBand[])[]
  readonly grounds: StripGrounds
  /** Names of the first and last band whose rows are in view. */
  readonly view?: readonly [first: string, last: string] | undefined
  readonly leader?: LeaderTarget | undefined
}

/** The exposure strip: every token of the system down the left edge of the page, and the way to each. */
export function Strip({ groups, grounds, view, leader }: StripProps) {
  const height = useWindowHeight()
  const narrow = useNarrow()
  const bands = placeBands(groups, height)
  const [pointed, setPointed] = useState<number>()
  const shown = pointed === undefined ? undefined : bands[pointed]
  const led = leader && bandOf(bands, leader.name)
  return (
    <nav
      aria-label="Strip of all tokens"
      className="fixed inset-y-0 left-0 z-20 w-36 wide:w-116 pointer-events-none print:hidden"
    >
      <StripCloth bands={bands} grounds={grounds} height={height} narrow={narrow} />
      {!narrow && view !== undefined && <Bracket bands={bands} view={view} />}
      {!narrow && leader !== undefined && led !== undefined && (
        <Leader band={led} target={leader} height={height} />
      )}
      <BandLinks bands={bands} onPoint={setPointed} start={led?.index ?? 0} />
      {shown !== undefined && <NameTag band={shown} height={height} />}
    </nav>
  )
}

interface BandLinksProps {
  readonly bands: readonly PlacedBand[]
  readonly onPoint: (index: number | undefined) => void
  /** The band that takes the tab stop until another had focus. */
  readonly start: number
}

function BandLinks({ bands, onPoint, start }: BandLinksProps) {
  const list = useRef<HTMLDivElement>(null)
  const [current, setCurrent] = useState<number>()
  const stop = Math.min(current ?? start, bands.length - 1)

  function walk(event: KeyboardEvent) {
    const next = nextBand(event.key, stop, bands.length)
    if (next === undefined) return
    event.preventDefault()
    list.current?.querySelectorAll('a')[next]?.focus()
  }

  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the links inside; each link is itself operable
    <div
      ref={list}
      onKeyDown={walk}
      onPointerLeave={() => onPoint(undefined)}
      className="absolute inset-y-0 left-8 w-20 wide:left-24 wide:w-48 pointer-events-auto"
    >
      {bands.map((band) => (
        <Link
          key={band.name}
          to={band.href}
          tabIndex={band.index === stop ? 0 : -1}
          aria-label={bandName(band)}
          style={{ top: band.top, height: band.high + 1 }}
          className="absolute inset-x-0 focus-visible:z-10 focus-visible:outline-offset-0"
          onPointerEnter={() => onPoint(band.index)}
          onFocus={() => {
            setCurrent(band.index)
            onPoint(band.index)
          }}
          onBlur={() => onPoint(undefined)}
        />
      ))}
    </div>
  )
}

function bandName(band: PlacedBand): string {
  return band.breach === undefined ? band.name : `${band.name}, breach`
}

function nextBand(key: string, from: number, count: number): number | undefined {
  const last = count - 1
  switch (key) {
    case 'ArrowDown':
    case 'ArrowRight':
      return Math.min(from + 1, last)
    case 'ArrowUp':
    case 'ArrowLeft':
      return Math.max(from - 1, 0)
    case 'PageDown':
      return Math.min(from + 10, last)
    case 'PageUp':
      return Math.max(from - 10, 0)
    case 'Home':
      return 0
    case 'End':
      return last
    default:
      return undefined
  }
}
