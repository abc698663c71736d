import { useCallback, useMemo } from 'react'
import { useSearchParams } from 'react-router-dom'
import type { CardChip } from '#console/features/shade-card/card-cut.ts'
import { columnsFor } from '#console/features/shade-card/card-geometry.ts'
import { cardInWords, ShadeCard } from '#console/features/shade-card/shade-card.tsx'
import { useCard, useProbe } from '#console/features/shade-card/use-card.ts'
import type { ModelNames } from '#console/lib/finding-words.ts'
import { followersOf, relationTo } from '#console/features/tokens/relation-words.ts'
import { shortOklch } from '#console/features/tokens/trial.ts'
import { whereInWords } from '#console/lib/finding-words.ts'
import { readNumber } from '#console/lib/read-number.ts'
import { WordButton } from '#console/ui/button.tsx'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { useWindowWidth } from '#console/ui/window-size.ts'
import type { ProbedBreach } from '#shared/checks/color-probe.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { countOf } from '#shared/checks/finding-words.ts'

/** The shade card of a token: its hue stands in the address. */
export function ShadeCardSection({
  evaluation,
  token,
  names,
  tried,
  looked,
  onTry,
  onLook,
}: {
  evaluation: Evaluation
  token: string
  names: ModelNames
  tried: string | undefined
  looked: CardChip | undefined
  onTry: (css: string) => void
  onLook: (chip: CardChip | undefined) => void
}) {
  const probe = useProbe(evaluation, token)
  const { hue, setHue } = useHue()
  const columns = columnsFor(useWindowWidth())
  const present = probe?.present
  const center = useMemo(
    () => present && (hue === undefined ? present : { ...present, h: hue }),
    [present, hue],
  )
  const cut = useMemo(
    () => ({
      center: center ?? { l: 0, c: 0, h: null, alpha: 1 },
      columns,
      hueStepDegrees: columns < 21 ? 10 : 5,
    }),
    [center, columns],
  )
  const card = useCard(probe, cut, shortOklch)
  const words = useBreachWords(evaluation, token, names)
  const take = useCallback(
    (chip: CardChip, isHue: boolean) => {
      if (isHue) setHue(chip.color.h === present?.h ? undefined : (chip.color.h ?? undefined))
      onTry(chip.css)
    },
    [onTry, setHue, present],
  )
  return (
    <section className="min-w-0" aria-label="Shade card">
      <div className="flex flex-wrap items-baseline gap-x-22 gap-y-2 pb-12">
        <h2 className="text-16 font-semibold">Shade card</h2>
        <p className="text-13 text-ink-soft">{card && cardInWords(card)}</p>
        {hue !== undefined && (
          <WordButton onClick={() => setHue(undefined)} className="text-13">
            Back to its own hue
          </WordButton>
        )}
      </div>
      {card !== undefined && (
        <ShadeCard
          card={card}
          isPresentHue={hue === undefined}
          tried={tried}
          looked={looked}
          {...words}
          onTry={take}
          onLook={onLook}
        >
          <LookedAt chip={looked} {...words} />
        </ShadeCard>
      )}
    </section>
  )
}

interface BreachWords {
  readonly withOf: (breach: ProbedBreach) => string
  readonly whereOf: (breach: ProbedBreach) => string
}

/** How a breach concerns the token, in words. */
function useBreachWords(evaluation: Evaluation, token: string, names: ModelNames): BreachWords {
  return useMemo(() => {
    const followers = followersOf(token, evaluation.dependents)
    return {
      withOf: ({ finding }) => {
        const relation = relationTo(token, finding, (id) => followers.has(id))
        const { word, other, through } = relation
        const as = through === undefined ? '' : `as ${names.token(through)} `
        return `${as}${word} ${names.token(other)}`
      },
      whereOf: ({ finding: { theme, foregroundState, backgroundState } }) =>
        whereInWords(names.theme(theme), [`${foregroundState}/${backgroundState}`]),
    }
  }, [evaluation, token, names])
}

/** What the chip under the pointer or the focus comes to. */
function LookedAt({ chip, withOf, whereOf }: BreachWords & { chip: CardChip | undefined }) {
  const [breach, ...others] = chip?.breaches ?? []
  return (
    <div className="mt-10 min-h-40">
      {chip === undefined ? (
        <p className="text-13 text-ink-soft">
          Arrow keys walk the card, Enter tries a chip, and the pointer can be drawn across it.
        </p>
      ) : (
        <>
          <p>
            <span className="font-medium">{chip.css}</span>
            <span className="text-ink-soft">, shown as {chip.hex}</span>
          </p>
          {breach !== undefined ? (
            <p className="flex flex-wrap items-baseline gap-x-12">
              <OutcomeMark kind="breach">would breach {withOf(breach)}</OutcomeMark>
              <span className="text-13 text-ink-soft">{whereOf(breach)}</span>
              <RatioColumns
                ratio={breach.ratio}
                required={breach.finding.required}
                outcome="breach"
              />
              {others.length > 0 && (
                <span className="text-13">and {countOf(others.length, 'finding')} more</span>
              )}
            </p>
          ) : (
            <p className="text-ink-soft">
              {chip.faults[0]?.detail ?? 'passes all its pairs in every theme and state'}
            </p>
          )}
        </>
      )}
    </div>
  )
}

/** The hue that the card is cut at, from the address; none where it is the token's own. */
function useHue() {
  const [search, setSearch] = useSearchParams()
  const hue = readNumber(search.get('hue') ?? '', 0, 360).value
  const setHue = useCallback(
    (next: number | undefined) =>
      setSearch(
        (before) => {
          const after = new URLSearchParams(before)
          if (next === undefined) after.delete('hue')
          else after.set('hue', String(Number(next.toFixed(3))))
          return after
        },
        { replace: true, preventScrollReset: true },
      ),
    [setSearch],
  )
  return { hue, setHue }
}
