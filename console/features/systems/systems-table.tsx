import { Link, useNavigate } from 'react-router-dom'
import { formatDay } from '#console/lib/format.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { type RowLinkProps, useRowWalk } from '#console/ui/row-walk.ts'
import type { SystemWire } from '#shared/contracts/systems.contract.ts'

interface SystemsTableProps {
  readonly systems: readonly SystemWire[]
  readonly href: (key: string) => string
  readonly role: (key: string) => string | undefined
}

export function SystemsTable({ systems, href, role }: SystemsTableProps) {
  const walk = useRowWalk(systems.length)
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the row links inside, which are operable
    <div ref={walk.container} onKeyDown={walk.onKeyDown} className="ledger">
      <table aria-label="Systems">
        <thead>
          <tr>
            <th>Key</th>
            <th className="@max-[760px]:hidden">Name</th>
            <th className="number w-70 @max-[500px]:hidden">Tokens</th>
            <th className="number w-60 @max-[500px]:hidden">Pairs</th>
            <th className="number w-70 @max-[760px]:hidden">Themes</th>
            <th className="w-200 @max-[900px]:hidden">
              <span className="pl-28">Head</span>
            </th>
            <th className="@max-[900px]:hidden">Your role</th>
            <th className="w-140 @min-[500px]:w-168">
              <span className="@min-[500px]:pl-28">Breaches</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {systems.map((system, index) => (
            <SystemRow
              key={system.id}
              system={system}
              href={href(system.key)}
              role={role(system.key)}
              link={walk.rowLink(index)}
            />
          ))}
        </tbody>
      </table>
    </div>
  )
}

function SystemRow({
  system,
  href,
  role,
  link,
}: {
  system: SystemWire
  href: string
  role: string | undefined
  link: RowLinkProps
}) {
  const navigate = useNavigate()
  const { counts, head } = system
  return (
    <tr
      data-opens
      onClick={(event) => {
        if (!(event.target instanceof HTMLAnchorElement)) void navigate(href)
      }}
    >
      <td className="row-start">
        <Link to={href} {...link} className="block truncate py-6 font-semibold">
          {system.key}
        </Link>
        <span className="-mt-6 mb-6 hidden truncate text-13 text-ink-soft @max-[760px]:block">
          {system.name}
        </span>
      </td>
      <td className="truncate @max-[760px]:hidden">{system.name}</td>
      <td className="number figures @max-[500px]:hidden">{counts.tokens}</td>
      <td className="number figures @max-[500px]:hidden">{counts.pairs}</td>
      <td className="number figures @max-[760px]:hidden">{counts.themes}</td>
      <td className="@max-[900px]:hidden">
        <span className="pl-28 text-ink-soft">
          revision {head.revision}, {formatDay(head.at)}
        </span>
      </td>
      <td className="text-ink-soft @max-[900px]:hidden">{role}</td>
      <td>
        <span className="@min-[500px]:pl-28">
          {counts.openBreaches > 0 ? (
            <OutcomeMark kind="breach">{counts.openBreaches} open</OutcomeMark>
          ) : (
            <span className="text-ink-soft">none open</span>
          )}
        </span>
      </td>
    </tr>
  )
}
