import { type ReactNode, useState } from 'react'
import { WordButton } from './button.tsx'

const FIRST_SHOWN = 7
/** What no one reads to its end need not be drawn to it. */
const MOST_SHOWN = 400

/** One part of what an edit would move, its first lines at once; the first part stands where nothing is in it. */
export function MovedPart<Line>({
  title,
  lines,
  isFirst = false,
  children,
}: {
  title: string
  lines: readonly Line[]
  isFirst?: boolean
  /** Draws a line as an item of a list. */
  children: (line: Line) => ReactNode
}) {
  const [isWhole, setWhole] = useState(false)
  if (lines.length === 0 && !isFirst) return null
  const shown = lines.slice(0, isWhole ? MOST_SHOWN : FIRST_SHOWN)
  return (
    <section className="mt-16">
      <h3
        className={`pb-6 text-13 font-semibold ${isFirst ? 'double-line' : 'border-b border-ink'}`}
      >
        {title}
      </h3>
      <ul>{shown.map(children)}</ul>
      {!isWhole && shown.length < lines.length && (
        <WordButton className="mt-10" onClick={() => setWhole(true)}>
          {lines.length > MOST_SHOWN ? `The first ${MOST_SHOWN} of` : 'All'} {lines.length} lines
        </WordButton>
      )}
    </section>
  )
}
