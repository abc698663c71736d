import { type RefObject, useEffect, useState } from 'react'

/** The part of a name that is looked for. The address follows it; it follows the address only while nobody writes. */
export function NameField({
  named,
  field,
  onChange,
}: {
  named: string
  field: RefObject<HTMLInputElement | null>
  onChange: (named: string) => void
}) {
  const [written, setWritten] = useState(named)
  useEffect(() => {
    if (document.activeElement !== field.current) setWritten(named)
  }, [named, field])
  return (
    <input
      id="find"
      ref={field}
      type="text"
      value={written}
      placeholder="any name"
      autoComplete="off"
      spellCheck={false}
      aria-keyshortcuts="/"
      onChange={(event) => {
        setWritten(event.target.value)
        onChange(event.target.value)
      }}
      className="line-input w-150"
    />
  )
}
