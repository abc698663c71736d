import { DERIVED_STATES, type DerivedState } from '#shared/checks/model.ts'

/** One half of a cell: a token on the ground of one theme, as hex. */
export interface CellHalf {
  readonly ground: string
  readonly rest: string
  /** By state; a token with rest only has none. */
  readonly states?: { readonly [state in DerivedState]?: string }
  readonly breaches?: boolean
}

const SIZES = {
  line: { width: 104, height: 24, bare: 3 },
  row: { width: 116, height: 28, bare: 4 },
  title: { width: 132, height: 38, bare: 5 },
} as const

const SLIVER = 5
const NOTCH = { deep: 11, high: 13 }

/** A token as a piece of the strip lying down: both themes, its states as slivers, a notch where it breaches. */
export function StripCell({
  light,
  dark,
  size = 'row',
  label,
}: {
  light: CellHalf
  dark: CellHalf
  size?: keyof typeof SIZES
  label: string
}) {
  const { width, height, bare } = SIZES[size]
  const hasStates = light.states !== undefined || dark.states !== undefined
  const high = height - 2 * bare - (hasStates ? SLIVER + 1 : 0)
  const middle = bare + high / 2
  const half = { width: width / 2, height, bare, high }
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      width={width}
      height={height}
      role="img"
      aria-label={label}
      className="own-colors block overflow-visible"
    >
      <CellGround half={light} x={0} {...half} />
      <CellGround half={dark} x={width / 2} {...half} />
      <Dye half={light} x={bare} {...half} />
      <Dye half={dark} x={width / 2} {...half} />
      <path d={`M.5.5h${width - 1}v${height - 1}H.5z`} fill="none" className="stroke-feint" />
      {light.breaches && <Notch edge={0} into={1} middle={middle} />}
      {dark.breaches && <Notch edge={width} into={-1} middle={middle} />}
    </svg>
  )
}

interface HalfBox {
  readonly half: CellHalf
  readonly x: number
  readonly width: number
  readonly height: number
  readonly bare: number
  readonly high: number
}

function CellGround({ half, x, width, height }: HalfBox) {
  return <rect x={x} y={0} width={width} height={height} fill={half.ground} />
}

function Dye({ half, x, width, bare, high }: HalfBox) {
  const wide = width - bare
  const sliver = (wide - 3) / 4
  return (
    <>
      <rect x={x} y={bare} width={wide} height={high} fill={half.rest} />
      {DERIVED_STATES.map((state, index) => {
        const fill = half.states?.[state]
        return (
          fill !== undefined && (
            <rect
              key={state}
              x={x + index * (sliver + 1)}
              y={bare + high + 1}
              width={sliver}
              height={SLIVER}
              fill={fill}
            />
          )
        )
      })}
    </>
  )
}

function Notch({ edge, into, middle }: { edge: number; into: 1 | -1; middle: number }) {
  const top = middle - NOTCH.high / 2
  const cut = `M${edge} ${top}L${edge + into * NOTCH.deep} ${middle}L${edge} ${top + NOTCH.high}`
  const stitch = into === 1 ? edge - 7 : edge + 4
  return (
    <>
      <path d={`${cut}z`} className="fill-(--cell-page,var(--color-ground))" />
      <path d={cut} fill="none" className="stroke-rule" />
      <rect x={stitch} y={middle - 5} width={3} height={10} className="mark-shape fill-madder" />
    </>
  )
}
