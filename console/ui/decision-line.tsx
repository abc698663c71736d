import { useId } from 'react'
import { SolidButton, WordButton } from './button.tsx'
import { LineField } from './line-field.tsx'

/** The decision under an edit: why, put back, save. What cannot be done yet says its reason. */
export function DecisionLine({
  message,
  onMessage,
  messageFault,
  isEdited,
  isSaving,
  obstacle,
  action = 'Save to the head',
  onPutBack,
}: {
  /** None where what is saved makes no revision that a reason could stand on. */
  message?: string
  onMessage?: (message: string) => void
  messageFault?: string | undefined
  isEdited: boolean
  isSaving: boolean
  /** Why it cannot be saved; none where it can. */
  obstacle: string | undefined
  action?: string
  onPutBack: () => void
}) {
  const reason = useId()
  return (
    <div className="mt-18 flex flex-wrap items-end gap-x-20 gap-y-12">
      {onMessage !== undefined && (
        <LineField
          label="Why, stands on the revision"
          value={message ?? ''}
          onChange={(event) => onMessage(event.target.value)}
          maxLength={500}
          autoComplete="off"
          fault={messageFault}
          className="w-full wide:w-250 full:w-450"
        />
      )}
      <div className="flex flex-1 flex-wrap items-center justify-end gap-x-22 gap-y-8">
        {obstacle !== undefined && (
          <p id={reason} className="w-full text-13 text-ink-soft wide:text-end full:w-auto">
            {obstacle}
          </p>
        )}
        <WordButton onClick={onPutBack} disabled={!isEdited}>
          Put back
        </WordButton>
        <SolidButton
          type="submit"
          disabled={obstacle !== undefined}
          aria-busy={isSaving}
          aria-describedby={obstacle === undefined ? undefined : reason}
        >
          {isSaving ? 'Saving' : action}
        </SolidButton>
      </div>
    </div>
  )
}
