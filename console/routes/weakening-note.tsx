import { useWhoMay } from './who-may.ts'

/** That an edit asks for less, in what, and who may approve that. */
export function WeakeningNote({
  system,
  weakenings,
}: {
  system: string
  weakenings: readonly string[]
}) {
  const who = useWhoMay(system)
  if (weakenings.length === 0) return null
  return (
    <div role="status" className="mt-14 border-t border-rule pt-10">
      <p>
        <span className="font-semibold">This asks for less than before.</span> It takes the approval
        of an accessibility lead.{who.oneOf('accessibility-lead')}
      </p>
      <ul className="mt-2 max-w-640 text-ink-soft">
        {weakenings.map((detail) => (
          <li key={detail}>{detail}</li>
        ))}
      </ul>
    </div>
  )
}
