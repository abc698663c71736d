import { type FormEvent, useState } from 'react'
import { readNumber } from '#console/lib/read-number.ts'
import { SolidButton } from '#console/ui/button.tsx'
import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { type Purpose, PURPOSES } from './key-words.ts'
import type { WantedKey } from './keys.queries.ts'

/** A key to be made: what it is called, what it is for, and how long it lasts. */
export function MakeKey({
  mayMakeCi,
  ciNote,
  faults,
  isMaking,
  onMake,
}: {
  /** Whether keys that do more than fetch may be made. */
  mayMakeCi: boolean
  /** Whom those take. */
  ciNote: string
  /** The service's own objections. */
  faults: { readonly name?: string | undefined; readonly days?: string | undefined }
  isMaking: boolean
  onMake: (key: WantedKey) => void
}) {
  const [name, setName] = useState('')
  const [purpose, setPurpose] = useState<Purpose>(mayMakeCi ? 'check' : 'read')
  const [days, setDays] = useState('90')
  const [isNameless, setNameless] = useState(false)
  const wanted = PURPOSES.find(({ value }) => value === purpose) ?? PURPOSES[0]
  const choices = mayMakeCi ? PURPOSES : PURPOSES.filter(({ value }) => value === 'read')
  const read = readNumber(days, 1, wanted.mostDays)
  const isWhole = Number.isInteger(read.value)
  const daysFault = isWhole ? faults.days : `Whole days, from 1 to ${wanted.mostDays}.`

  function submit(event: FormEvent) {
    event.preventDefault()
    setNameless(name.trim() === '')
    if (name.trim() === '' || !isWhole) return
    onMake({ name: name.trim(), scopes: wanted.scopes, days: read.value ?? 90 })
  }

  return (
    <form onSubmit={submit} noValidate className="mt-22 border-t border-rule pt-14 pb-44">
      <h2 className="text-16 font-semibold">Make a key</h2>
      <div className="mt-8 flex flex-wrap items-end gap-x-20 gap-y-12">
        <LineField
          label="Name, to know it by"
          value={name}
          maxLength={120}
          autoComplete="off"
          fault={isNameless ? 'What is it called?' : faults.name}
          onChange={(event) => {
            setNameless(false)
            setName(event.target.value)
          }}
          className="w-full wide:w-250"
        />
        <div className="flex min-h-30 min-w-0 flex-wrap items-end gap-x-8">
          to
          <Choice label="What it is for" value={purpose} options={choices} onChange={setPurpose} />
        </div>
        <LineField
          label="Days until it expires"
          figures
          inputMode="numeric"
          autoComplete="off"
          value={days}
          fault={daysFault}
          onChange={(event) => setDays(event.target.value)}
          className="w-150"
        />
        <SolidButton type="submit" aria-busy={isMaking}>
          Make the key
        </SolidButton>
      </div>
      {!mayMakeCi && <p className="mt-8 text-13 text-ink-soft">{ciNote}</p>}
    </form>
  )
}
