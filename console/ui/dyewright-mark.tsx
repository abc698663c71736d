import { consoleColor } from './console-colors.ts'

const GROUND = consoleColor('ground')
const DYES = ['madder', 'weld', 'woad'].map(consoleColor)

/** The sign of the product, cut from the strip; it keeps both halves in both modes. */
export function DyewrightMark({ height = 28 }: { height?: number }) {
  return (
    <svg
      viewBox="0 0 24 32"
      width={(height * 3) / 4}
      height={height}
      aria-hidden="true"
      className="own-colors block shrink-0"
    >
      <path d="M0 0h12v32H0z" fill={GROUND.light.hex} />
      <path d="M12 0h12v32H12z" fill={GROUND.dark.hex} />
      {DYES.map((dye, index) => (
        <g key={dye.name}>
          <path d={`M3 ${3 + 9 * index}h9v8H3z`} fill={dye.light.hex} />
          <path d={`M12 ${3 + 9 * index}h9v8h-9z`} fill={dye.dark.hex} />
        </g>
      ))}
      <path d="M.5.5h23v31H.5z" fill="none" className="stroke-edge" />
    </svg>
  )
}
