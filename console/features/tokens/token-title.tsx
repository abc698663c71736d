import { countOf } from '#shared/checks/finding-words.ts'
import type { ReactNode, Ref } from 'react'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { joinWords, startSentence } from '#console/lib/format.ts'
import type { LedgerTokenWire } from '#shared/contracts/tokens.contract.ts'

/** An opened token: its whole name, what it is for, how it stands, and its cells. */
export function TokenTitle({
  token,
  followers,
  themes,
  title,
  children,
}: {
  token: LedgerTokenWire
  /** Names of the tokens that follow it. */
  followers: readonly string[]
  /** Theme keys in which it breaches. */
  themes: readonly string[]
  title: Ref<HTMLHeadingElement>
  /** The cells. */
  children: ReactNode
}) {
  const { breaches } = token.standing
  return (
    <div className="flex flex-wrap items-start justify-between gap-x-36 gap-y-14 pt-16 pb-14">
      <div className="flex min-w-0 flex-wrap items-start gap-x-36 gap-y-4">
        <h1 ref={title} className="large-name min-w-0 break-words">
          {token.name}
        </h1>
        <div className="max-w-640 min-w-0">
          <p>{aboutToken(token, followers)}</p>
          {breaches > 0 && (
            <p>
              <OutcomeMark kind="breach">
                {startSentence(countOf(breaches, 'breach', 'breaches'))}
                {token.standing.mark === 'breach-on-it' && ' on it'}
                {themes.length > 0 && ` in ${joinWords(themes)}`}
              </OutcomeMark>
            </p>
          )}
        </div>
      </div>
      {children}
    </div>
  )
}

const MOST_NAMED = 3

/** What it is for, in its own words, and what follows it just now. */
function aboutToken({ description }: LedgerTokenWire, followers: readonly string[]): string {
  const named =
    followers.length > MOST_NAMED
      ? [...followers.slice(0, MOST_NAMED), `${followers.length - MOST_NAMED} more`]
      : followers
  const follow = `${joinWords(named)} ${followers.length === 1 ? 'follows' : 'follow'} it`
  const parts = [description?.replace(/\.$/, ''), named.length > 0 ? follow : undefined]
  const sentence = parts.filter((part) => part !== undefined).join('; ')
  return sentence === '' ? '' : `${sentence}.`
}

/** One of the two cells beside the title, with its caption. */
export function CaptionedCell({ caption, children }: { caption: string; children: ReactNode }) {
  return (
    <figure>
      {children}
      <figcaption className="mt-4 text-12 text-ink-soft">{caption}</figcaption>
    </figure>
  )
}
