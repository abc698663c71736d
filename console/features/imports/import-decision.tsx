import { useId } from 'react'
import { SolidButton } from '#console/ui/button.tsx'
import { LineField } from '#console/ui/line-field.tsx'

/** The decision: why, try it, import. What cannot be done yet says its reason. */
export function ImportDecision({
  message,
  onMessage,
  messageFault,
  doing,
  mayTry,
  obstacle,
  onTry,
}: {
  message: string
  onMessage: (message: string) => void
  messageFault: string | undefined
  /** What is being done just now. */
  doing: 'trying' | 'importing' | undefined
  mayTry: boolean
  /** Why it cannot be imported; none where it can. */
  obstacle: string | undefined
  onTry: () => void
}) {
  const reason = useId()
  return (
    <div className="mt-22 flex flex-wrap items-end gap-x-20 gap-y-12">
      <LineField
        label="Why, stands on the revision"
        value={message}
        onChange={(event) => onMessage(event.target.value)}
        maxLength={500}
        autoComplete="off"
        fault={messageFault}
        className="w-full wide:w-250 full:w-450"
      />
      <div className="flex flex-1 flex-wrap items-center justify-end gap-x-22 gap-y-8">
        {obstacle !== undefined && (
          <p id={reason} className="w-full text-13 text-ink-soft wide:text-end full:w-auto">
            {obstacle}
          </p>
        )}
        <button
          type="button"
          disabled={!mayTry}
          aria-busy={doing === 'trying'}
          onClick={onTry}
          className="min-h-30 border border-ink px-16 font-medium hover:bg-ground-deep disabled:border-dashed disabled:border-edge disabled:bg-transparent disabled:text-ink-soft"
        >
          {doing === 'trying' ? 'Trying' : 'Try it'}
        </button>
        <SolidButton
          type="submit"
          disabled={obstacle !== undefined}
          aria-busy={doing === 'importing'}
          aria-describedby={obstacle === undefined ? undefined : reason}
        >
          {doing === 'importing' ? 'Importing' : 'Import'}
        </SolidButton>
      </div>
    </div>
  )
}
