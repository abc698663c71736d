import { Button, ListBox, ListBoxItem, Popover, Select, SelectValue } from 'react-aria-components'

export interface Option<Value extends string> {
  readonly value: Value
  /** As it stands in the sentence. */
  readonly text: string
}

/** A choice inside a sentence: woad words on a line, with a list under them. */
export function Choice<Value extends string>({
  label,
  value,
  options,
  onChange,
}: {
  label: string
  value: Value
  options: readonly Option<Value>[]
  onChange: (value: Value) => void
}) {
  return (
    <Select
      aria-label={label}
      value={value}
      onChange={(key) => onChange(key as Value)}
      className="inline-block max-w-full min-w-0"
    >
      <Button className="group inline-flex max-w-full items-baseline border-b border-woad font-medium text-woad data-[focus-visible]:outline-2">
        <SelectValue className="min-w-0 text-start" />
        <Chevron />
      </Button>
      <Popover offset={6} className="min-w-(--trigger-width) border border-ink bg-ground">
        <ListBox items={options} className="max-h-320 overflow-y-auto py-4 outline-none">
          {(option) => (
            <ListBoxItem
              id={option.value}
              textValue={option.text}
              className="flex min-h-30 items-center border-l-4 border-transparent forced-colors:border-[Canvas] pr-16 pl-10 data-[focused]:bg-woad-wash data-[selected]:border-ink forced-colors:data-[selected]:border-[CanvasText] data-[selected]:font-semibold data-[focus-visible]:-outline-offset-2"
            >
              {option.text}
            </ListBoxItem>
          )}
        </ListBox>
      </Popover>
    </Select>
  )
}

function Chevron() {
  return (
    <svg viewBox="0 0 8 6" width="8" height="6" aria-hidden="true" className="ml-6 self-center">
      <path d="M.75 1 4 4.5 7.25 1" fill="none" strokeWidth="1.5" className="stroke-woad" />
    </svg>
  )
}
