import { type ComponentProps, useId } from 'react'

interface LineAreaProps extends ComponentProps<'textarea'> {
  readonly label: string
  /** What is wrong with it, as one sentence. */
  readonly fault?: string | undefined
}

/** A field of several lines; it grows with what is written. */
export function LineArea({ label, fault, className = '', ...rest }: LineAreaProps) {
  const field = useId()
  return (
    <div className={`min-w-0 ${className}`}>
      <label htmlFor={field} className="block text-12 text-ink-soft">
        {label}
      </label>
      <textarea
        id={field}
        rows={2}
        aria-invalid={fault !== undefined}
        aria-describedby={fault === undefined ? undefined : `${field}-fault`}
        className="line-input mt-2 block field-sizing-content max-h-240 min-h-44 w-full resize-none"
        {...rest}
      />
      {fault !== undefined && (
        <p id={`${field}-fault`} className="mt-4 text-13 font-semibold text-madder">
          {fault}
        </p>
      )}
    </div>
  )
}
