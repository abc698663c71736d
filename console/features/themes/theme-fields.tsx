import type { ReactNode } from 'react'
import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import type { Level } from '#shared/checks/model.ts'
import type { DraftedTheme, ThemeDraft } from './theme-draft.ts'

export type FieldFaults = { readonly [member in keyof ThemeDraft]?: string | undefined }

const GATING_CHOICES = [
  { value: 'gates', text: 'fails a check and blocks a release' },
  { value: 'reports', text: 'is only reported' },
] as const

/** Members of a theme, as fields and sentences. */
export function ThemeFields({
  theme,
  parents,
  tokens,
  systemLevel,
  faults,
  onChange,
  children,
}: {
  theme: DraftedTheme
  /** Keys of the themes that it may derive from; none for the base. */
  parents: readonly string[]
  tokens: readonly string[]
  systemLevel: Level
  faults: FieldFaults
  onChange: (part: ThemeDraft) => void
  /** The rule. */
  children: ReactNode
}) {
  const isBase = theme.from === undefined
  const levels = [
    { value: 'system', text: `the level of the system, ${systemLevel}` },
    { value: 'AA', text: 'level AA' },
    { value: 'AAA', text: 'level AAA' },
  ] as const
  return (
    <>
      <div className="flex flex-wrap items-start gap-x-20 gap-y-14">
        <LineField
          label="Name"
          value={theme.name}
          maxLength={120}
          autoComplete="off"
          fault={faults.name}
          onChange={(event) => onChange({ name: event.target.value })}
          className="w-full wide:w-200"
        />
        {(['ground', 'ink'] as const).map((role) => (
          <NameBox
            key={role}
            label={role === 'ground' ? 'Ground' : 'Ink'}
            value={theme[role]}
            names={tokens}
            fault={faults[role]}
            onChange={(name) => onChange({ [role]: name })}
            className="w-full wide:w-220"
          />
        ))}
      </div>
      {!isBase && (
        <div className="mt-16 border-t border-feint pt-10">
          <div className="flex min-h-30 flex-wrap items-baseline gap-x-8 gap-y-4">
            It derives from
            <Choice
              label="Parent"
              value={theme.from ?? ''}
              options={parents.map((key) => ({ value: key, text: key }))}
              onChange={(from) => onChange({ from })}
            />
            {faults.from !== undefined && (
              <span className="font-semibold text-madder">{faults.from}</span>
            )}
          </div>
          {children}
        </div>
      )}
      <div className="mt-14 flex flex-wrap items-baseline gap-x-8 gap-y-4 border-t border-feint pt-12">
        Its pairs are held to
        <Choice
          label="Level"
          value={theme.level ?? 'system'}
          options={levels}
          onChange={(level) => onChange({ level: level === 'system' ? null : level })}
        />
        and a breach in it
        <Choice
          label="Gating"
          value={theme.gating ? 'gates' : 'reports'}
          options={GATING_CHOICES}
          onChange={(gating) => onChange({ gating: gating === 'gates' })}
        />
        {(faults.level ?? faults.gating) !== undefined && (
          <span className="font-semibold text-madder">{faults.level ?? faults.gating}</span>
        )}
      </div>
    </>
  )
}
