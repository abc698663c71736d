import { useId, useMemo, useState } from 'react'
import { ComboBox, Input, Label, ListBox, ListBoxItem, Popover } from 'react-aria-components'

/** Enough to see that there are more: typing narrows them. */
const MOST_OFFERED = 60

/** What is written in the field, and the value that it was written over. */
interface Typing {
  readonly written: string | undefined
  readonly over: string
  /** Handed on already, and not the value yet. */
  readonly isTaken: boolean
}

/** One name of many: written, or taken from the list that what is written narrows. */
export function NameBox({
  label,
  value,
  names,
  fault,
  isDisabled = false,
  isLabelHidden = false,
  placeholder,
  nothing = 'No token has this name.',
  onChange,
  className = '',
}: {
  label: string
  value: string
  names: readonly string[]
  fault?: string | undefined
  isDisabled?: boolean
  /** In a sentence, where the words around it say what it is. */
  isLabelHidden?: boolean
  /** What an empty field stands for. */
  placeholder?: string
  /** What to say where no name holds what is written. */
  nothing?: string
  onChange: (name: string) => void
  className?: string
}) {
  const nothingTyped = { written: undefined, over: value, isTaken: false }
  const [{ written, over, isTaken }, setTyping] = useState<Typing>(nothingTyped)
  // What was taken stands in the field until it has become the value: an address moves a little later.
  if (over !== value) setTyping(nothingTyped)
  const text = written ?? value
  const offered = useMemo(() => offeredNames(names, written), [names, written])
  const faultId = useId()
  const write = (next: string, isTaken = false) =>
    setTyping({ written: next === value ? undefined : next, over: value, isTaken })
  const take = (name: string) => {
    write(name, true)
    if (name !== value) onChange(name)
  }
  const leave = () => {
    if (written !== undefined && !isTaken) take(written.trim())
    setTyping(nothingTyped)
  }
  return (
    <ComboBox
      items={offered}
      inputValue={text}
      value={names.includes(value) ? value : null}
      onInputChange={(next) => write(next)}
      onChange={(key) => key !== null && take(String(key))}
      isDisabled={isDisabled}
      menuTrigger="focus"
      allowsCustomValue
      allowsEmptyCollection
      className={`min-w-0 ${className}`}
    >
      <Label className={isLabelHidden ? 'sr-only' : 'block text-12 text-ink-soft'}>{label}</Label>
      <Input
        autoComplete="off"
        spellCheck={false}
        placeholder={placeholder}
        aria-invalid={fault !== undefined}
        aria-describedby={fault === undefined ? undefined : faultId}
        onBlur={leave}
        className="line-input mt-2 h-30 w-full font-medium"
      />
      {fault !== undefined && (
        <p id={faultId} className="mt-4 text-13 font-semibold text-madder">
          {fault}
        </p>
      )}
      <Popover offset={4} className="w-(--trigger-width) min-w-240 border border-ink bg-ground">
        <ListBox
          className="max-h-320 overflow-y-auto py-4 outline-none"
          renderEmptyState={() => <p className="px-14 py-6 text-ink-soft">{nothing}</p>}
        >
          {({ id }: { id: string }) => (
            <ListBoxItem
              id={id}
              textValue={id}
              className="flex min-h-30 items-center border-l-4 border-transparent pr-16 pl-10 break-all data-[focused]:bg-woad-wash data-[selected]:border-ink data-[selected]:font-semibold forced-colors:border-[Canvas] forced-colors:data-[selected]:border-[CanvasText]"
            >
              {id}
            </ListBoxItem>
          )}
        </ListBox>
      </Popover>
    </ComboBox>
  )
}

/** Names that hold what is written, those that begin with it first; all of them while nobody writes. */
function offeredNames(names: readonly string[], written: string | undefined) {
  const typed = (written ?? '').trim().toLowerCase()
  const begins = names.filter((name) => name.toLowerCase().startsWith(typed))
  const holds = names.filter(
    (name) => !name.toLowerCase().startsWith(typed) && name.toLowerCase().includes(typed),
  )
  return [...begins, ...holds].slice(0, MOST_OFFERED).map((id) => ({ id }))
}
