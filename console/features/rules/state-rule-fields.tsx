import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import type { DerivedState } from '#shared/checks/model.ts'
import type { StateRuleWire } from '#shared/contracts/rules.contract.ts'
import { STATE_FIELDS, readStateRuleText, type StateRuleText } from './state-rule-text.ts'
import { referenceNames, unbraced } from './theme-rule-text.ts'

/** One state's rule as a row of fields; what is left empty is written in faintly, from the wider rule. */
export function StateRuleFields({
  state,
  text,
  wider,
  tokens,
  referenceFault,
  onChange,
}: {
  state: DerivedState
  text: StateRuleText
  /** What holds where this scope says nothing. */
  wider: StateRuleWire
  tokens: readonly string[]
  referenceFault?: string | undefined
  onChange: (text: StateRuleText) => void
}) {
  const reading = readStateRuleText(text)
  const faults = reading.ok ? {} : reading.faults
  const widerSide =
    wider.towards === undefined
      ? `away from ${unbraced(wider.away) || 'ground'}`
      : `towards ${unbraced(wider.towards)}`
  const sides = [
    { value: 'inherited', text: `${widerSide}, as wider` },
    { value: 'away', text: 'away from' },
    { value: 'towards', text: 'towards' },
  ] as const
  return (
    <fieldset className="min-w-0 border-b border-feint py-12">
      <legend className="sr-only">{state}</legend>
      <div className="flex flex-wrap items-end gap-x-20 gap-y-10">
        <span aria-hidden="true" className="w-full font-medium wide:w-70 wide:pb-5">
          {state}
        </span>
        {STATE_FIELDS.map(({ field, label }) => (
          <LineField
            key={field}
            label={label}
            figures
            inputMode="decimal"
            autoComplete="off"
            placeholder={String(wider[field] ?? '')}
            value={text[field]}
            fault={faults[field]}
            onChange={(event) => onChange({ ...text, [field]: event.target.value })}
            className="w-80"
          />
        ))}
        <div className="flex min-h-30 min-w-0 items-end">
          <Choice
            label={`${state}: direction`}
            value={text.direction}
            options={sides}
            onChange={(direction) => onChange({ ...text, direction })}
          />
        </div>
        {text.direction !== 'inherited' && (
          <NameBox
            label="Reference"
            value={text.reference}
            names={referenceNames(tokens)}
            fault={faults.reference ?? referenceFault}
            onChange={(reference) => onChange({ ...text, reference })}
            className="w-full wide:w-200"
          />
        )}
      </div>
    </fieldset>
  )
}
