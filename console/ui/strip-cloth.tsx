import type { PlacedBand } from './strip-geometry.ts'

/** The page colours of the two halves, as hex. */
export interface StripGrounds {
  readonly light: string
  readonly dark: string
}

interface Cut {
  /** Width of the whole cloth, of the bare ground outside, px. */
  readonly width: number
  readonly bare: number
  readonly left: number
  readonly deep: number
  /** Length of a stitch. */
  readonly stitch: number
}

const WIDE: Cut = { left: 24, width: 48, bare: 6, deep: 13, stitch: 5 }
const NARROW: Cut = { left: 8, width: 20, bare: 3, deep: 8, stitch: 3 }

/** The drawing of the strip: two grounds, two bars a token, and the notches. */
export function StripCloth({
  bands,
  grounds,
  height,
  narrow,
}: {
  bands: readonly PlacedBand[]
  grounds: StripGrounds
  height: number
  narrow: boolean
}) {
  const cut = narrow ? NARROW : WIDE
  const half = cut.width / 2
  const middle = cut.left + half
  const bar = half - cut.bare
  return (
    <svg
      width={cut.left + cut.width + 10}
      height={height}
      aria-hidden="true"
      className="own-colors absolute top-0 left-0 block"
    >
      <rect x={cut.left} width={half} height={height} fill={grounds.light} />
      <rect x={middle} width={half} height={height} fill={grounds.dark} />
      {bands.map((band) => (
        <g key={band.name}>
          <rect x={middle - bar} y={band.top} width={bar} height={band.high} fill={band.light} />
          <rect x={middle} y={band.top} width={bar} height={band.high} fill={band.dark} />
          {(band.breach === 'light' || band.breach === 'both') && (
            <BandNotch band={band} edge={cut.left} into={1} cut={cut} />
          )}
          {(band.breach === 'dark' || band.breach === 'both') && (
            <BandNotch band={band} edge={cut.left + cut.width} into={-1} cut={cut} />
          )}
        </g>
      ))}
    </svg>
  )
}

interface BandNotchProps {
  readonly band: PlacedBand
  readonly edge: number
  /** 1 cuts towards the right, −1 towards the left. */
  readonly into: 1 | -1
  readonly cut: Cut
}

function BandNotch({ band, edge, into, cut: { deep, stitch } }: BandNotchProps) {
  const middle = band.top + band.high / 2
  const high = Math.min(Math.max(band.high - 1, 1), 13)
  const cut = `M${edge} ${middle - high / 2}L${edge + into * deep} ${middle}L${edge} ${middle + high / 2}`
  const thick = band.breachOnIt ? 2 : 4
  return (
    <>
      <path d={`${cut}z`} className="fill-ground" />
      {high >= 8 && <path d={cut} fill="none" className="stroke-rule" />}
      <rect
        x={into === 1 ? edge - 2 - stitch : edge + 2}
        y={middle - thick / 2}
        width={stitch}
        height={thick}
        className="mark-shape fill-madder"
      />
    </>
  )
}
