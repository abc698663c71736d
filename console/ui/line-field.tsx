import { type ComponentProps, useId } from 'react'

interface LineFieldProps extends ComponentProps<'input'> {
  readonly label: string
  /** What is wrong with it, as one sentence. */
  readonly fault?: string | undefined
  readonly figures?: boolean
}

/** A field is a line under what is written: edge, woad with focus, madder words where it is refused. */
export function LineField({
  label,
  fault,
  figures = false,
  className = '',
  id,
  ...rest
}: LineFieldProps) {
  const own = useId()
  const field = id ?? own
  return (
    <div className={`min-w-0 ${className}`}>
      <label htmlFor={field} className="block text-12 text-ink-soft">
        {label}
      </label>
      <input
        id={field}
        aria-invalid={fault !== undefined}
        aria-describedby={fault === undefined ? undefined : `${field}-fault`}
        className={`line-input mt-2 h-30 w-full ${figures ? 'figures' : ''} font-medium`}
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
