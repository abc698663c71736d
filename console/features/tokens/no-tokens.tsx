import { countInWords } from '#shared/checks/finding-words.ts'
import { Link } from 'react-router-dom'
import { startSentence } from '#console/lib/format.ts'
import { WordButton } from '#console/ui/button.tsx'
import { NothingHere } from '#console/ui/page-states.tsx'
import type { NearNames } from './ledger-rows.ts'

/** A system before its first token. */
export function NoTokenYet({ importHref }: { importHref: string }) {
  return (
    <NothingHere title="This ledger has no token yet.">
      <Link to={importHref} className="word-woad font-medium">
        Import a file
      </Link>
      , or send tokens over the API: one at a time, or all of them.
    </NothingHere>
  )
}

const MOST_OFFERED = 8

/** Nothing answers to the sentence; names that begin alike are offered. */
export function NoTokenFound({
  near,
  href,
  onAll,
}: {
  /** What is near to the name that no token has; none where it is the rest of the sentence that finds nothing. */
  near: NearNames | undefined
  href: (name: string) => string
  onAll: () => void
}) {
  const offered = near === undefined || near.names.length > MOST_OFFERED ? [] : near.names
  return (
    <NothingHere
      title={near === undefined ? 'No token answers to this sentence.' : titleFor(near, offered)}
    >
      {offered.length > 0 && (
        <ul className="flex flex-col gap-x-22 gap-y-4 wide:flex-row wide:flex-wrap">
          {offered.map((name) => (
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

function titleFor({ start }: NearNames, offered: readonly string[]): string {
  if (offered.length === 0) return 'No token has this name.'
  const begin = offered.length === 1 ? 'begins' : 'begin'
  const count = startSentence(countInWords(offered.length))
  return `No token has this name. ${count} ${begin} with ${start.replace(/\.$/, '')}.`
}
