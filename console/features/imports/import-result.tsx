import type { ReactNode } from 'react'
import { startSentence } from '#console/lib/format.ts'
import { Choice } from '#console/ui/choice.tsx'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { countOf } from '#shared/checks/finding-words.ts'
import type { ImportWire } from '#shared/contracts/import-outcome.ts'
import type { ChangeCells } from './change-cells.ts'
import { type ChangeFilter, chosenChanges, DID_CHOICES, SHOW_CHOICES } from './change-filter.ts'
import { ChangeTable } from './change-table.tsx'
import { checkInWords, talliesInWords } from './change-words.ts'
import { FindingList } from './finding-list.tsx'
import { NoteLists } from './note-list.tsx'

/** What an import changed, or would change: its check first, then what was read otherwise, then item by item. */
export function ImportResult({
  outcome,
  cells,
  filter,
  onFilter,
  children,
}: {
  outcome: ImportWire
  cells: ChangeCells
  filter: ChangeFilter
  onFilter: (filter: ChangeFilter) => void
  /** What it weakens, and for whom. */
  children?: ReactNode
}) {
  const { dryRun, effect, check, counts, more } = outcome
  const isNothing = outcome.changes.length === 0
  return (
    <section aria-label={dryRun ? 'What this would change' : 'What it changed'} className="pt-22">
      <h2 className="text-16 font-semibold">{titleOf(outcome)}</h2>
      <ul className="mt-4 flex flex-wrap gap-x-28 gap-y-2 text-ink-soft">
        {talliesInWords(outcome).map((tally) => (
          <li key={tally}>{tally}</li>
        ))}
        {counts.derivedAgain > 0 && (
          <li>{startSentence(countOf(counts.derivedAgain, 'colour'))} derived again</li>
        )}
      </ul>
      {children}
      {!isNothing && (
        <>
          <p className="mt-18 flex flex-wrap items-baseline gap-x-12 gap-y-2">
            <span className="text-16 font-semibold">
              {check.verdict === 'pass' ? (
                'The check passes'
              ) : (
                <OutcomeMark kind="breach">The check fails</OutcomeMark>
              )}
            </span>
            <span>{checkInWords(outcome)}</span>
          </p>
          <FindingList
            title={`${startSentence(countOf(effect.opened.length, 'newly breaching', 'newly breaching'))}`}
            findings={effect.opened}
          />
          <FindingList
            title={`${startSentence(countOf(effect.resolved.length, 'newly passing', 'newly passing'))}`}
            findings={effect.resolved}
            isBefore
          />
        </>
      )}
      <NoteLists outcome={outcome} />
      {!isNothing && <Changes {...{ outcome, cells, filter, onFilter }} />}
      {more?.changes !== undefined && (
        <p className="pt-10 text-ink-soft">
          And {more.changes.toLocaleString('en-GB')} more, not listed here.
        </p>
      )}
    </section>
  )
}

function titleOf({ dryRun, changes, written, effect }: ImportWire): string {
  if (dryRun) {
    return changes.length === 0
      ? 'This would change nothing: the system says all of it already.'
      : 'What this would change'
  }
  return written
    ? `Imported as revision ${effect.revision}.`
    : 'Nothing changed, and no revision was made: the system said all of it already.'
}

function Changes({
  outcome: { changes },
  cells,
  filter,
  onFilter,
}: {
  outcome: ImportWire
  cells: ChangeCells
  filter: ChangeFilter
  onFilter: (filter: ChangeFilter) => void
}) {
  const there = new Set<string>(changes.map(({ item }) => item))
  const chosen = chosenChanges(changes, filter)
  return (
    <>
      <search
        aria-label="Changes"
        className="mt-22 flex flex-wrap items-center gap-x-8 gap-y-6 border-t border-rule pt-14"
      >
        Show
        <Choice
          label="Kind"
          value={filter.show}
          options={SHOW_CHOICES.filter(
            ({ value }) => value === 'all' || value === filter.show || there.has(value),
          )}
          onChange={(show) => onFilter({ ...filter, show })}
        />
        that {filter.show === 'all' ? 'is' : 'are'}
        <Choice
          label="What happens to it"
          value={filter.did}
          options={DID_CHOICES}
          onChange={(did) => onFilter({ ...filter, did })}
        />
        <p role="status" className="w-full text-ink-soft wide:ml-auto wide:w-auto">
          {chosen.length === changes.length
            ? countOf(changes.length, 'change')
            : `${chosen.length.toLocaleString('en-GB')} of ${countOf(changes.length, 'change')}`}
        </p>
      </search>
      {chosen.length > 0 && <ChangeTable changes={chosen} cells={cells} />}
    </>
  )
}
