import { type KeyboardEvent, useState } from 'react'
import { LineField } from '#console/ui/line-field.tsx'

/** One component of the tried colour: written, or stepped by the arrows. */
export function ComponentField({
  label,
  value,
  text,
  step,
  onChange,
}: {
  label: string
  value: number | null
  /** The value as it reads when nobody writes. */
  text: string
  step: number
  onChange: (value: number) => void
}) {
  const [draft, setDraft] = useState<string>()

  function take(written: string) {
    setDraft(written)
    const number = Number.parseFloat(written)
    if (Number.isFinite(number)) onChange(number)
  }

  function onKeyDown(event: KeyboardEvent) {
    const direction = event.key === 'ArrowUp' ? 1 : event.key === 'ArrowDown' ? -1 : 0
    if (direction === 0) return
    event.preventDefault()
    setDraft(undefined)
    onChange(Number(((value ?? 0) + direction * step * (event.shiftKey ? 10 : 1)).toFixed(5)))
  }

  return (
    <LineField
      label={label}
      figures
      inputMode="decimal"
      autoComplete="off"
      value={draft ?? text}
      onChange={(event) => take(event.target.value)}
      onBlur={() => setDraft(undefined)}
      onKeyDown={onKeyDown}
      className="w-0 flex-1 wide:w-80 wide:flex-none"
    />
  )
}
