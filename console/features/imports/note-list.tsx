import { useState } from 'react'
import { WordButton } from '#console/ui/button.tsx'
import { startSentence } from '#console/lib/format.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import type { ImportNoteWire, ImportWire } from '#shared/contracts/import-outcome.ts'

const KINDS = [
  ['converted', 'converted from an older spelling'],
  ['overridden', 'derived before, set by hand from now on'],
  ['left-out', 'left out'],
] as const

const FIRST_SHOWN = 6
const MOST_LINES = 400

/** What of a file was read otherwise than it stands there. */
export function NoteLists({ outcome: { notes, more } }: { outcome: ImportWire }) {
  return (
    <>
      {KINDS.map(([kind, words]) => (
        <NoteList key={kind} words={words} notes={notes.filter((note) => note.kind === kind)} />
      ))}
      {more?.notes !== undefined && (
        <p className="mt-8 text-ink-soft">
          And {more.notes.toLocaleString('en-GB')} more of these.
        </p>
      )}
    </>
  )
}

function NoteList({ words, notes }: { words: string; notes: readonly ImportNoteWire[] }) {
  const [isWhole, setWhole] = useState(false)
  if (notes.length === 0) return null
  const shown = notes.slice(0, isWhole ? MOST_LINES : FIRST_SHOWN)
  return (
    <section className="mt-18">
      <h3 className="border-b border-ink pb-6 text-13 font-semibold">
        {startSentence(countOf(notes.length, words, words))}
      </h3>
      <ul>
        {shown.map((note) => (
          <li
            key={`${placeOf(note)} ${note.detail}`}
            className="grid gap-x-16 border-b border-feint py-6 wide:grid-cols-[minmax(0,2fr)_minmax(0,3fr)]"
          >
            <span className="font-medium break-all">{placeOf(note)}</span>
            <span className="break-words text-ink-soft">{note.detail}</span>
          </li>
        ))}
      </ul>
      {!isWhole && shown.length < notes.length && (
        <WordButton className="mt-10" onClick={() => setWhole(true)}>
          {notes.length > MOST_LINES ? `The first ${MOST_LINES}` : 'All'} of {notes.length} lines
        </WordButton>
      )}
    </section>
  )
}

const placeOf = ({ pointer, line }: ImportNoteWire): string =>
  line === undefined ? pointer || 'the whole' : `line ${line}`
