import type { ComponentProps } from 'react'

/** The one solid button of a view. */
export function SolidButton({
  className = '',
  type = 'button',
  ...rest
}: ComponentProps<'button'>) {
  return (
    <button
      type={type}
      className={`min-h-30 bg-ink px-16 py-4 font-medium text-ground hover:bg-ink-soft disabled:border disabled:border-dashed disabled:border-edge disabled:bg-transparent disabled:text-ink-soft forced-colors:border ${className}`}
      {...rest}
    />
  )
}

/** A secondary action: an underlined word. */
export function WordButton({ className = '', type = 'button', ...rest }: ComponentProps<'button'>) {
  return (
    <button
      type={type}
      className={`word disabled:border-dashed disabled:text-ink-soft ${className}`}
      {...rest}
    />
  )
}
