import { type FormEvent, useState } from 'react'
import { SolidButton } from '#console/ui/button.tsx'
import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import type { Role } from '#shared/contracts/permissions.ts'
import { ROLE_CHOICES, ROLE_SENTENCES } from './member-moves.ts'

/** Somebody who has an account, to be given a role here. */
export function AddMember({
  emails,
  fault,
  isSaving,
  onAdd,
}: {
  /** Addresses that are members already. */
  emails: readonly string[]
  /** The service's own objection. */
  fault: string | undefined
  isSaving: boolean
  onAdd: (member: { email: string; role: Role }) => void
}) {
  const [email, setEmail] = useState('')
  const [role, setRole] = useState<Role>('engineer')
  const [own, setOwn] = useState<string>()

  function submit(event: FormEvent) {
    event.preventDefault()
    const written = email.trim().toLowerCase()
    const found =
      written === ''
        ? 'Whose address?'
        : emails.includes(written)
          ? 'Is a member already.'
          : undefined
    setOwn(found)
    if (found === undefined) onAdd({ email: written, role })
  }

  return (
    <form onSubmit={submit} noValidate className="mt-22 border-t border-rule pt-14 pb-44">
      <h2 className="text-16 font-semibold">Add somebody</h2>
      <div className="mt-8 flex flex-wrap items-end gap-x-20 gap-y-12">
        <LineField
          label="E-mail of their account"
          type="email"
          value={email}
          autoComplete="off"
          fault={own ?? fault}
          onChange={(event) => {
            setOwn(undefined)
            setEmail(event.target.value)
          }}
          className="w-full wide:w-300"
        />
        <div className="flex min-h-30 items-end gap-x-8">
          as
          <Choice label="Role to give" value={role} options={ROLE_CHOICES} onChange={setRole} />
        </div>
        <SolidButton type="submit" aria-busy={isSaving}>
          Add them
        </SolidButton>
      </div>
      <p className="mt-8 text-13 text-ink-soft">
        {ROLE_CHOICES.find(({ value }) => value === role)?.text}: {ROLE_SENTENCES[role]}.
      </p>
    </form>
  )
}
