import { formatDay } from '#console/lib/format.ts'
import { WordButton } from '#console/ui/button.tsx'
import type { KeyWire } from '#shared/contracts/keys.contract.ts'
import { scopesInWords } from './key-words.ts'

/** The keys in force, never the keys themselves: each with what it may do and when it was used last. */
export function KeysTable({
  keys,
  hasOwners,
  onRevoke,
}: {
  keys: readonly KeyWire[]
  /** Whether keys of several people stand in the list. */
  hasOwners: boolean
  onRevoke: (key: KeyWire) => void
}) {
  return (
    <div className="ledger mt-14">
      <table aria-label="Keys">
        <thead>
          <tr>
            <th>Name</th>
            <th className="@max-[720px]:hidden">Does</th>
            <th className="w-130 @max-[900px]:hidden">Begins with</th>
            {hasOwners && <th className="w-130 @max-[1100px]:hidden">Of</th>}
            <th className="w-100 @max-[560px]:hidden">Last used</th>
            <th className="w-100">Until</th>
            <th className="w-76">
              <span className="sr-only">Revoke</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {keys.map((key) => (
            <tr key={key.id}>
              <td className="row-start py-6! pr-12! break-words">
                <span className="font-medium">{key.name}</span>
                <span className="hidden text-13 text-ink-soft @max-[720px]:block">
                  {scopesInWords(key.scopes)}
                </span>
                {hasOwners && (
                  <span className="hidden text-13 text-ink-soft @max-[1100px]:block">
                    of {key.owner.name}
                  </span>
                )}
              </td>
              <td className="py-6! pr-12! @max-[720px]:hidden">{scopesInWords(key.scopes)}</td>
              <td className="figures text-ink-soft @max-[900px]:hidden">{key.hint}…</td>
              {hasOwners && (
                <td className="truncate text-ink-soft @max-[1100px]:hidden">{key.owner.name}</td>
              )}
              <td className="figures text-ink-soft @max-[560px]:hidden">
                {key.lastUsedAt === null ? 'never' : formatDay(key.lastUsedAt)}
              </td>
              <td className="figures">{formatDay(key.expiresAt)}</td>
              <td className="text-end!">
                <WordButton aria-label={`Revoke ${key.name}`} onClick={() => onRevoke(key)}>
                  Revoke
                </WordButton>
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}
