import { WordButton } from './button.tsx'

/** One member of something that two people edited, in words. */
export interface VersionRow {
  readonly member: string
  readonly now: string
  readonly yours: string
}

/** What somebody else saved meanwhile beside what was typed here: nothing of either is lost. */
export function TwoVersions({
  title,
  rows,
  onKeepYours,
  onTakeTheirs,
}: {
  title: string
  rows: readonly VersionRow[]
  onKeepYours: () => void
  onTakeTheirs: () => void
}) {
  return (
    <div role="alert" className="mt-14 border-t border-ink pt-10">
      <p className="font-semibold">{title}</p>
      <div className="ledger mt-8">
        <table aria-label="Both versions">
          <thead>
            <tr>
              <th className="w-[22%]">Member</th>
              <th>As it is now</th>
              <th>As you have it</th>
            </tr>
          </thead>
          <tbody>
            {rows.map(({ member, now, yours }) => (
              <tr key={member}>
                <td className="row-start py-6! pr-10! align-top! text-ink-soft">{member}</td>
                <td className="py-6! pr-16! align-top! break-words whitespace-pre-wrap">{now}</td>
                <td
                  className={`py-6! align-top! break-words whitespace-pre-wrap ${now === yours ? 'text-ink-soft' : 'font-medium'}`}
                >
                  {yours}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <p className="mt-10 flex flex-wrap gap-x-28 gap-y-6">
        <WordButton onClick={onKeepYours}>Save yours over it</WordButton>
        <WordButton onClick={onTakeTheirs}>Take it as it is now</WordButton>
      </p>
    </div>
  )
}
