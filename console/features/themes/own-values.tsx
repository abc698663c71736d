import { type FormEvent, type ReactNode, useState } from 'react'
import { WordButton } from '#console/ui/button.tsx'
import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import type { State } from '#shared/checks/model.ts'
import type { OwnValue } from './theme-draft.ts'

/** What a theme sets itself, whatever its rule would make of it. */
export function OwnValues({
  values,
  swatchOf,
  onTakeAway,
  onPutBack,
}: {
  values: readonly OwnValue[]
  /** The colour as it ships, drawn on the theme's ground. */
  swatchOf: (value: OwnValue) => ReactNode
  onTakeAway: (value: OwnValue) => void
  onPutBack: (value: OwnValue) => void
}) {
  if (values.length === 0) {
    return <p className="mt-6 text-ink-soft">Nothing: every colour follows from the rule.</p>
  }
  return (
    <div className="ledger mt-10 overflow-x-clip">
      <table aria-label="Values of its own">
        <thead>
          <tr>
            <th>Token</th>
            <th className="w-70 @max-[460px]:hidden">State</th>
            <th className="w-76 @max-[460px]:hidden">Seen</th>
            <th className="w-[38%] @max-[460px]:hidden">Set to</th>
            <th className="w-80">
              <span className="sr-only">Take away</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {values.map((value) => (
            <ValueRow
              key={`${value.token}/${value.state}`}
              value={value}
              swatch={swatchOf(value)}
              onTakeAway={onTakeAway}
              onPutBack={onPutBack}
            />
          ))}
        </tbody>
      </table>
    </div>
  )
}

function ValueRow({
  value,
  swatch,
  onTakeAway,
  onPutBack,
}: {
  value: OwnValue
  swatch: ReactNode
  onTakeAway: (value: OwnValue) => void
  onPutBack: (value: OwnValue) => void
}) {
  const { token, state, now, drafted } = value
  const isEdited = now !== drafted
  const action = isEdited && now !== undefined ? 'Put back' : 'Take away'
  const words = <ValueWords now={now} drafted={drafted} />
  return (
    <tr>
      <td className="row-start py-6! pr-10! break-words">
        <span className="font-medium">{token}</span>
        <span className="hidden text-13 @max-[460px]:block">
          <span className="text-ink-soft">{state}</span> {words}
        </span>
      </td>
      <td className="text-ink-soft @max-[460px]:hidden">{state}</td>
      <td className="@max-[460px]:hidden">{drafted !== undefined && swatch}</td>
      <td className="figures py-6! pr-10! text-13 break-words @max-[460px]:hidden">{words}</td>
      <td className="text-end!">
        <WordButton
          aria-label={`${action} ${token} ${state}`}
          onClick={() => (isEdited ? onPutBack : onTakeAway)(value)}
        >
          {action}
        </WordButton>
      </td>
    </tr>
  )
}

/** What it is set to, and where that is edited what it is now. */
function ValueWords({ now, drafted }: Pick<OwnValue, 'now' | 'drafted'>) {
  if (drafted === undefined) {
    return (
      <span className="text-ink-soft">
        taken away, was <s>{now}</s>
      </span>
    )
  }
  return (
    <>
      {drafted}
      {now !== drafted && (
        <span className="block text-ink-soft">
          {now === undefined ? 'not set now' : `${now} now`}
        </span>
      )}
    </>
  )
}

/** One more value to set: which token, in which state, to which colour. */
export function SetValue({
  tokens,
  statesOf,
  faultOf,
  onSet,
}: {
  tokens: readonly string[]
  /** The states in which a token may be set here. */
  statesOf: (token: string) => readonly State[]
  /** What is wrong with a value that was written. */
  faultOf: (text: string) => string | undefined
  onSet: (value: { token: string; state: State; value: string }) => void
}) {
  const [token, setToken] = useState('')
  const [state, setState] = useState<State>('rest')
  const [text, setText] = useState('')
  const [faults, setFaults] = useState<{ token?: string; text?: string }>({})
  const states = statesOf(token)
  const chosen = states.includes(state) ? state : (states[0] ?? 'rest')

  function submit(event: FormEvent) {
    event.preventDefault()
    event.stopPropagation()
    const fault = faultOf(text.trim())
    const found = {
      ...(tokens.includes(token) ? {} : { token: 'Name a token of the ledger.' }),
      ...(fault === undefined ? {} : { text: fault }),
    }
    setFaults(found)
    if (Object.keys(found).length > 0) return
    onSet({ token, state: chosen, value: text.trim() })
    setToken('')
    setText('')
  }

  return (
    <form onSubmit={submit} className="mt-14 flex flex-wrap items-end gap-x-20 gap-y-12">
      <NameBox
        label="Set another token"
        value={token}
        names={tokens}
        fault={faults.token}
        onChange={setToken}
        className="w-full wide:w-200"
      />
      <div className="flex min-h-30 items-end gap-x-8">
        at
        <Choice
          label="State to set"
          value={chosen}
          options={states.map((each) => ({ value: each, text: each }))}
          onChange={setState}
        />
        to
      </div>
      <LineField
        label="Any CSS colour, or a token in braces"
        value={text}
        autoComplete="off"
        spellCheck={false}
        fault={faults.text}
        onChange={(event) => setText(event.target.value)}
        className="w-full wide:w-230"
      />
      <WordButton type="submit">Set it</WordButton>
    </form>
  )
}
