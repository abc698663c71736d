import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import { KIND_WORDS } from './rule-words.ts'
import {
  FIELDS_OF_KIND,
  readsAgainst,
  readThemeRuleText,
  referenceNames,
  type ThemeRuleText,
} from './theme-rule-text.ts'

const KIND_CHOICES = Object.entries(KIND_WORDS).map(([value, text]) => ({ value, text }))

/** A theme rule as a sentence, and the fields that its kind reads. */
export function ThemeRuleFields({
  subject,
  text,
  tokens,
  canInherit = false,
  referenceFault,
  onChange,
}: {
  /** How the sentence begins: `Its colours`, `In dark they`. */
  subject: string
  text: ThemeRuleText
  /** Names that `against` may be. */
  tokens: readonly string[]
  /** Whether the kind may be left to a wider rule. */
  canInherit?: boolean
  referenceFault?: string | undefined
  onChange: (text: ThemeRuleText) => void
}) {
  const reading = readThemeRuleText(text)
  const choices = canInherit
    ? [{ value: 'inherited', text: 'follow the wider rule' }, ...KIND_CHOICES]
    : KIND_CHOICES
  return (
    <div className="flex flex-wrap items-end gap-x-20 gap-y-14">
      <div className="flex min-h-30 min-w-0 flex-wrap items-end gap-x-8 gap-y-4">
        {subject}
        <Choice
          label={`${subject}: rule`}
          value={text.kind}
          options={choices as { value: ThemeRuleText['kind']; text: string }[]}
          onChange={(kind) => onChange({ ...text, kind })}
        />
      </div>
      {readsAgainst(text.kind) && (
        <NameBox
          label="Measured against"
          value={text.against || (text.kind === 'inherited' ? '' : 'ground')}
          names={referenceNames(tokens)}
          fault={referenceFault}
          onChange={(against) => onChange({ ...text, against })}
          className="w-full wide:w-200"
        />
      )}
      {FIELDS_OF_KIND[text.kind].map(({ field, label }) => (
        <LineField
          key={field}
          label={label}
          figures
          inputMode="decimal"
          autoComplete="off"
          placeholder={canInherit ? 'as wider' : field === 'k' || field === 'chroma' ? '1' : '0'}
          value={text[field]}
          fault={reading.ok ? undefined : reading.faults[field]}
          onChange={(event) => onChange({ ...text, [field]: event.target.value })}
          className="w-130"
        />
      ))}
    </div>
  )
}
