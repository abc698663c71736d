import { joinWords } from '#console/lib/format.ts'
import {
  type ClosestCouple,
  type DistinctMeasure,
  DISTINCT_VIEWS,
} from '#shared/checks/distinct-measure.ts'
import { truncateRatio } from '#shared/checks/finding-words.ts'

/** A set in one theme. */
export interface SetMeasure {
  /** Theme key. */
  readonly theme: string
  /** Couples by token name. */
  readonly couples: DistinctMeasure
}

const VIEW_WORDS = {
  plain: 'as it is',
  protan: 'protanopia',
  deutan: 'deuteranopia',
  tritan: 'tritanopia',
} as const

/** The couple hardest to tell apart in each theme, as it is and with each colour-vision deficiency. */
export function SetMeasures({
  label,
  measures,
}: {
  label: string
  measures: readonly SetMeasure[]
}) {
  return (
    <ul aria-label={label} className="mt-12 border-t-3 border-double border-ink">
      {measures.map(({ theme, couples }) => (
        <li
          key={theme}
          className="grid gap-x-20 gap-y-8 border-b border-feint py-8 wide:grid-cols-[72px_repeat(4,minmax(0,1fr))]"
        >
          <span className="font-medium">{theme}</span>
          {DISTINCT_VIEWS.map((view) => (
            <Couple key={view} words={VIEW_WORDS[view]} couple={couples[view]} />
          ))}
        </li>
      ))}
    </ul>
  )
}

function Couple({ words, couple }: { words: string; couple: ClosestCouple }) {
  return (
    <span className="min-w-0">
      <span className="figures font-medium">ΔE {truncateRatio(couple.deltaE2000, 2)}</span>{' '}
      <span className="text-13 text-ink-soft">{words}</span>
      <span className="block text-13 break-words text-ink-soft">
        {joinWords([couple.first, couple.second])}
      </span>
    </span>
  )
}
