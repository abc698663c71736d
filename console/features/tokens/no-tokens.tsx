import { Link } from 'react-router-dom'
import { countInWords, startSentence } from '#console/lib/format.ts'
import { WordButton } from '#console/ui/button.tsx'
import { NothingHere } from '#console/ui/page-states.tsx'

/** A system before its first token. */
export function NoTokenYet() {
  return (
    <NothingHere title="This ledger has no token yet.">
      Tokens arrive over the API: one at a time, or a whole file. The API reference shows both.
    </NothingHere>
  )
}

const MOST_OFFERED = 8

/** Nothing answers to the sentence; names that begin alike are offered. */
export function NoTokenFound({
  named,
  near,
  href,
  onAll,
}: {
  named: string
  near: readonly string[]
  href: (name: string) => string
  onAll: () => void
}) {
  const isNamed = named.trim() !== ''
  return (
    <NothingHere title={isNamed ? namedTitle(near.length) : 'No token answers to this sentence.'}>
      {isNamed && near.length > 0 && near.length <= MOST_OFFERED && (
        <ul className="flex flex-wrap gap-x-22 gap-y-4">
          {near.map((name) => (
            <li key={name}>
              <Link to={href(name)} className="word-woad font-medium">
                {name}
              </Link>
            </li>
          ))}
        </ul>
      )}
      <p className="mt-10">
        <WordButton className="text-ink" onClick={onAll}>
          Show every token
        </WordButton>
      </p>
    </NothingHere>
  )
}

function namedTitle(near: number): string {
  if (near === 0 || near > MOST_OFFERED) return 'No token has this name.'
  const begin = near === 1 ? 'begins' : 'begin'
  return `No token has this name. ${startSentence(countInWords(near))} ${begin} with it.`
}
