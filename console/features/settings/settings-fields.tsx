import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import type { SystemWire } from '#shared/contracts/systems.contract.ts'
import { ProtectedBranches } from './protected-branches.tsx'
import { Setting } from './setting.tsx'
import { readFloor, type SettingsDraft } from './settings-draft.ts'

const LEVEL_CHOICES = [
  { value: 'AA', text: 'AA' },
  { value: 'AAA', text: 'AAA' },
] as const
const P3_CHOICES = [
  { value: 'gates', text: 'ships, is measured, and gates where its ratio is the lower one' },
  { value: 'ships', text: 'ships and is measured, and sRGB alone gates' },
  { value: 'off', text: 'does not ship' },
] as const
const MODE_CHOICES = [
  { value: 'direct', text: 'straight to the head' },
  { value: 'review', text: 'by review only' },
] as const

/** Every setting of a system, each with who may change it. */
export function SettingsFields({
  system,
  draft,
  faults,
  onChange,
}: {
  system: SystemWire
  draft: SettingsDraft
  faults: { readonly [member in keyof SettingsDraft]?: string | undefined }
  onChange: (part: SettingsDraft) => void
}) {
  const { name, level, writeMode, protectedBranches } = { ...system, ...draft }
  const floor = draft.disabledFloor ?? String(system.disabledFloor ?? '')
  return (
    <>
      <Setting title="Name" who="A maintainer changes it; it is in no revision.">
        <LineField
          label={`Name of ${system.key}`}
          value={name}
          maxLength={120}
          autoComplete="off"
          fault={name.trim() === '' ? 'A system has a name.' : faults.name}
          onChange={(event) => onChange({ name: event.target.value })}
          className="w-full wide:w-300"
        />
      </Setting>
      <Setting
        title="Level"
        who="An accessibility lead or a maintainer raises it; lowering it weakens, and takes the lead."
        fault={faults.level}
      >
        Every pair is held to WCAG 2.2 level{' '}
        <Choice
          label="Level"
          value={level}
          options={LEVEL_CHOICES}
          onChange={(next) => onChange({ level: next })}
        />
        ; a theme or a pair may ask for more.
      </Setting>
      <Display system={system} draft={draft} fault={faults.p3} onChange={onChange} />
      <Setting
        title="Disabled"
        who="A maintainer changes it; lowering it weakens, and takes the lead’s approval."
      >
        <LineField
          label="Least ratio in the disabled state; empty: exempt, as WCAG has it"
          figures
          inputMode="decimal"
          autoComplete="off"
          value={floor}
          fault={readFloor(floor).fault ?? faults.disabledFloor}
          onChange={(event) => onChange({ disabledFloor: event.target.value })}
          className="max-w-400"
        />
      </Setting>
      <Setting
        title="Edits"
        who="A maintainer or an accessibility lead asks for review; only the lead sets direct again."
        fault={faults.writeMode}
      >
        Edits go{' '}
        <Choice
          label="Write mode"
          value={writeMode}
          options={MODE_CHOICES}
          onChange={(next) => onChange({ writeMode: next })}
        />
        .
      </Setting>
      <Setting
        title="Protected branches"
        who="A maintainer or an accessibility lead adds one; only the lead takes one away."
        fault={faults.protectedBranches}
      >
        <ProtectedBranches
          branches={protectedBranches}
          onChange={(branches) => onChange({ protectedBranches: branches })}
        />
      </Setting>
    </>
  )
}

function Display({
  system,
  draft,
  fault,
  onChange,
}: {
  system: SystemWire
  draft: SettingsDraft
  fault: string | undefined
  onChange: (part: SettingsDraft) => void
}) {
  const { p3, p3Gates } = { ...system, ...draft }
  return (
    <Setting
      title="Display P3"
      who="A maintainer changes it; switching it off weakens, and takes the lead’s approval."
      fault={fault}
    >
      Beside sRGB, Display P3{' '}
      <Choice
        label="Display P3"
        value={p3 ? (p3Gates ? 'gates' : 'ships') : 'off'}
        options={P3_CHOICES}
        onChange={(next) => onChange({ p3: next !== 'off', p3Gates: next === 'gates' })}
      />
      . The P3 ratio is outside WCAG’s definition.
    </Setting>
  )
}
