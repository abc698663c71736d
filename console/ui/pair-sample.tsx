const WIDTH = 92
const HEIGHT = 24

/** A pair as it is seen: the foreground as a bar on the background, notched where it breaches. */
export function PairSample({
  foreground,
  background,
  breaches,
}: {
  foreground: string
  background: string
  breaches: boolean
}) {
  const middle = HEIGHT / 2
  const cut = breaches ? `V${middle + 5}L7 ${middle}L.5 ${middle - 5}` : ''
  return (
    <svg
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      width={WIDTH}
      height={HEIGHT}
      aria-hidden="true"
      className="own-colors block"
    >
      <path
        d={`M.5.5H${WIDTH - 0.5}V${HEIGHT - 0.5}H.5${cut}z`}
        fill={background}
        className="stroke-feint"
      />
      <rect x={22} y={middle - 2.5} width={48} height={5} fill={foreground} />
    </svg>
  )
}
