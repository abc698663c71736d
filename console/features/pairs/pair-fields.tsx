import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import { DERIVED_STATES, type Level, type State } from '#shared/checks/model.ts'
import { BackdropFields } from './backdrop-fields.tsx'
import type { PairDraft, PairFields as Fields } from './pair-draft.ts'
import { EXEMPTION_CHOICES, RELATION_CHOICES, USE_CHOICES } from './pair-words.ts'
import { Places } from './place-choice.tsx'

export interface PairFieldsProps {
  readonly fields: Fields
  readonly tokens: readonly string[]
  readonly themes: readonly string[]
  /** Names of groups that other pairs are in, and products that they serve. */
  readonly groups: readonly string[]
  readonly products: readonly string[]
  readonly systemLevel: Level
  /** By pointer into the body. */
  readonly faultAt: (pointer: string) => string | undefined
  readonly onChange: (part: PairDraft) => void
}

/** Every member of a pair: what stands on what, where it occurs, and what is asked of it. */
export function PairFields(props: PairFieldsProps) {
  return (
    <>
      <Sides {...props} />
      <Occurrence {...props} />
      <Demands {...props} />
    </>
  )
}

function Sides({ fields, tokens, faultAt, onChange }: PairFieldsProps) {
  return (
    <div className="flex flex-wrap items-start gap-x-20 gap-y-14">
      <NameBox
        label="Foreground"
        value={fields.foreground}
        names={tokens}
        fault={faultAt('/foreground')}
        onChange={(foreground) => onChange({ foreground })}
        className="w-full wide:w-250"
      />
      <NameBox
        label="Background"
        value={fields.background}
        names={tokens}
        fault={faultAt('/background')}
        onChange={(background) => onChange({ background })}
        className="w-full wide:w-250"
      />
      <div className="flex min-h-50 flex-wrap items-end gap-x-8 gap-y-4 pb-5">
        as
        <Choice
          label="Use"
          value={fields.use}
          options={USE_CHOICES}
          onChange={(use) => onChange({ use })}
        />
        <Choice
          label="Relation"
          value={fields.relation}
          options={RELATION_CHOICES}
          onChange={(relation) => onChange({ relation })}
        />
      </div>
    </div>
  )
}

function Occurrence({ fields, tokens, themes, faultAt, onChange }: PairFieldsProps) {
  return (
    <div className="mt-16 grid gap-y-12 border-t border-feint pt-12 full:grid-cols-2 full:gap-x-44">
      <Places
        legend="Themes"
        all="in all themes"
        places={themes}
        chosen={fields.themes}
        fault={faultAt('/themes')}
        onChange={(chosen) => onChange({ themes: chosen })}
      />
      <Places
        legend="States"
        all="in all states"
        always="rest"
        places={DERIVED_STATES}
        chosen={fields.states?.filter((state) => state !== 'rest')}
        fault={faultAt('/states')}
        onChange={(chosen) =>
          onChange({ states: chosen && (['rest', ...chosen] as readonly State[]) })
        }
      />
      <BackdropFields
        backdrop={fields.backdrop}
        tokens={tokens}
        fault={faultAt('/backdrop')}
        onChange={(backdrop) => onChange({ backdrop })}
      />
    </div>
  )
}

function Demands(props: PairFieldsProps) {
  const { fields, groups, products, systemLevel, faultAt, onChange } = props
  const levels = [
    { value: 'system', text: `the level of the system, ${systemLevel}` },
    { value: 'AA', text: 'level AA' },
    { value: 'AAA', text: 'level AAA' },
  ] as const
  return (
    <div className="mt-14 border-t border-feint pt-12">
      <div className="flex flex-wrap items-start gap-x-20 gap-y-14">
        <div className="min-h-50 w-full wide:w-250">
          <span className="block text-12 text-ink-soft">Held to</span>
          <span className="flex min-h-32 items-center">
            <Choice
              label="Level"
              value={fields.level}
              options={levels}
              onChange={(level) => onChange({ level })}
            />
          </span>
          <Fault text={faultAt('/level')} />
        </div>
        <LineField
          label="Least ratio of its own"
          value={fields.minimum}
          inputMode="decimal"
          autoComplete="off"
          figures
          fault={faultAt('/minimum')}
          onChange={(event) => onChange({ minimum: event.target.value })}
          className="w-full wide:w-140"
        />
        <NameBox
          label="Product"
          value={fields.product}
          names={products}
          nothing="None yet; it is taken as written."
          fault={faultAt('/product')}
          onChange={(product) => onChange({ product })}
          className="w-full wide:w-200"
        />
        <NameBox
          label="Group of which one is enough"
          value={fields.anyOf}
          names={groups}
          nothing="None yet; it is taken as written."
          fault={faultAt('/anyOf')}
          onChange={(anyOf) => onChange({ anyOf })}
          className="w-full wide:w-280"
        />
      </div>
      <Exemption {...props} />
    </div>
  )
}

function Exemption({ fields, faultAt, onChange }: PairFieldsProps) {
  return (
    <div className="mt-8 flex flex-wrap items-start gap-x-20 gap-y-10">
      <div className="flex min-h-30 flex-wrap items-end gap-x-8 pb-5">
        With
        <Choice
          label="Exemption"
          value={fields.exempt}
          options={EXEMPTION_CHOICES}
          onChange={(exempt) => onChange({ exempt })}
        />
      </div>
      {fields.exempt !== 'none' && (
        <LineField
          label="Why it is exempt"
          value={fields.reason}
          maxLength={500}
          autoComplete="off"
          fault={faultAt('/exempt')}
          onChange={(event) => onChange({ reason: event.target.value })}
          className="w-full wide:w-450"
        />
      )}
    </div>
  )
}

function Fault({ text }: { text: string | undefined }) {
  return text === undefined ? null : (
    <p className="mt-4 text-13 font-semibold text-madder">{text}</p>
  )
}
