import { countOf, stateInWords } from '#shared/checks/finding-words.ts'
import { joinWords, startSentence } from '#console/lib/format.ts'
import { SolidButton, WordButton } from '#console/ui/button.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import type { saveToken } from './tokens.queries.ts'

export type SavedToken = Awaited<ReturnType<typeof saveToken>>

/** The decision: why, put back, save. What cannot be done yet says its reason. */
export function SaveLine({
  message,
  onMessage,
  fault,
  isTried,
  isSaving,
  obstacle,
  onPutBack,
}: {
  message: string
  onMessage: (message: string) => void
  fault: string | undefined
  isTried: boolean
  isSaving: boolean
  /** Why it cannot be saved; none where it can. */
  obstacle: string | undefined
  onPutBack: () => void
}) {
  return (
    <div className="mt-14 flex flex-wrap items-end gap-x-20 gap-y-12">
      <LineField
        label="Why, stands on the revision"
        value={message}
        onChange={(event) => onMessage(event.target.value)}
        maxLength={500}
        fault={fault}
        className="w-full wide:w-250 full:w-450"
      />
      <div className="flex flex-1 flex-wrap items-center justify-end gap-x-22 gap-y-8">
        {obstacle !== undefined && (
          <p id="save-obstacle" className="w-full text-13 text-ink-soft wide:text-end full:w-auto">
            {obstacle}
          </p>
        )}
        <WordButton onClick={onPutBack} disabled={!isTried}>
          Put back
        </WordButton>
        <SolidButton
          type="submit"
          disabled={obstacle !== undefined}
          aria-busy={isSaving}
          aria-describedby={obstacle === undefined ? undefined : 'save-obstacle'}
        >
          {isSaving ? 'Saving' : 'Save to the head'}
        </SolidButton>
      </div>
    </div>
  )
}

/** What a save did, in one sentence, and its breaches by name. */
export function SavedNote({ saved }: { saved: Pick<SavedToken, 'effect'> }) {
  const { revision, opened, resolved } = saved.effect
  const parts = [
    opened.length > 0 ? `${countOf(opened.length, 'breach', 'breaches')} opened` : undefined,
    resolved.length > 0 ? `${countOf(resolved.length, 'breach', 'breaches')} resolved` : undefined,
  ].filter((part) => part !== undefined)
  return (
    <div role="status" className="mt-12">
      <p>
        <span className="font-semibold">Saved as revision {revision}.</span>{' '}
        {parts.length === 0 ? 'No verdict moved' : startSentence(joinWords(parts))}.
      </p>
      {opened.length > 0 && (
        <ul className="mt-4 flex flex-wrap gap-x-22">
          {opened.slice(0, 4).map((finding) => (
            <li key={finding.fingerprint}>
              <OutcomeMark kind="breach">
                {finding.foreground} on {finding.background}, {finding.theme},{' '}
                {stateInWords(finding.state)}
              </OutcomeMark>
            </li>
          ))}
          {opened.length > 4 && <li>and {opened.length - 4} more in the breach log</li>}
        </ul>
      )}
    </div>
  )
}
