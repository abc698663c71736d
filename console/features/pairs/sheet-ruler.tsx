import { ratioPosition, RATIO_LINES } from '#console/ui/ratio-scale.ts'

const FIGURES = [1, 1.5, 2, 3, 4.5, 7, 10, 15, 21] as const
const FEW = new Set<number>([1, 3, 4.5, 7, 21])
const TICKS = [
  1.1, 1.2, 1.3, 1.4, 1.6, 1.7, 1.8, 1.9, 2.25, 2.5, 2.75, 3.5, 4, 5, 5.5, 6, 6.5, 8, 9, 11, 12, 13,
  14, 16, 17, 18, 19, 20,
] as const

const isLine = (ratio: number) => RATIO_LINES.some((line) => line === ratio)

/** The one ruler over all bands: 1 to 21, logarithmic, the lines of WCAG heavier. */
export function SheetRuler() {
  return (
    <div aria-hidden="true" className="sheet-ruler figures">
      <span className="self-end pb-2 text-12 text-ink-soft max-wide:hidden">Background</span>
      <span className="relative block h-34">
        {FIGURES.map((ratio) => (
          <span
            key={ratio}
            className={`absolute top-2 text-13 ${isLine(ratio) ? 'font-semibold' : 'text-ink-soft'} ${FEW.has(ratio) ? '' : 'max-wide:hidden'} ${ratio === 1 ? '' : ratio === 21 ? '-translate-x-full' : '-translate-x-1/2'}`}
            style={{ left: `${ratioPosition(ratio, 100)}%` }}
          >
            {ratio}
          </span>
        ))}
        {[...FIGURES, ...TICKS].map((ratio) => (
          <span
            key={ratio}
            className={`absolute bottom-0 bg-ink ${isLine(ratio) ? 'h-12 w-2' : FIGURES.some((each) => each === ratio) ? 'h-9 w-1' : 'h-5 w-1'}`}
            style={{ left: `${ratioPosition(ratio, 100)}%` }}
          />
        ))}
      </span>
    </div>
  )
}
