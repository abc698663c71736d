import { useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useMemo, useState } from 'react'
import { type LoaderFunctionArgs, useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { memberQueries } from '#console/features/members/members.queries.ts'
import {
  readScope,
  rulesOf,
  type Scope,
  scopedRules,
  scopeText,
} from '#console/features/rules/rule-scopes.ts'
import { ruleQueries } from '#console/features/rules/rules.queries.ts'
import { RulesTable } from '#console/features/rules/rules-table.tsx'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { WordButton } from '#console/ui/button.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import { OpenedRules } from './opened-rules.tsx'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.ensureQueryData(ruleQueries.all(system)),
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
    queryClient.ensureQueryData(memberQueries.all(system)),
  ])
  return null
}

/** The rules of a system, of name prefixes and of single tokens; one scope may be opened and edited. */
export function Component() {
  const { system = '' } = useParams()
  const [search] = useSearchParams()
  const { data: rules } = useSuspenseQuery(ruleQueries.all(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const of = search.get('of')
  const opened = useMemo(() => readScope(of), [of])
  const openedText = opened && scopeText(opened)
  const scopes = scopedRules(rules, tokens)
  const isListed = scopes.some(({ scope }) => scopeText(scope) === openedText)
  const rows =
    opened === undefined || isListed ? scopes : [rulesOf(opened, rules, tokens), ...scopes]
  return (
    <>
      <title>{`Rules of ${system} · Dyewright`}</title>
      <p className="max-w-720 pt-14 text-ink-soft">
        A state follows from rest, and a theme from its parent, by rules that are merged field by
        field from wide to narrow: the system, prefixes from short to long, then the token.
      </p>
      <RulesTable
        scopes={rows}
        opened={openedText}
        href={(text) =>
          paths.rules(system, text === openedText ? '' : `?of=${encodeURIComponent(text)}`)
        }
        under={
          opened !== undefined && (
            <OpenedRules key={openedText} system={system} scoped={rulesOf(opened, rules, tokens)} />
          )
        }
      />
      <NarrowOn system={system} />
    </>
  )
}

/** The way to a scope that has no rules yet: a prefix or a whole name. */
function NarrowOn({ system }: { system: string }) {
  const navigate = useNavigate()
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const [name, setName] = useState('')
  const [fault, setFault] = useState<string>()
  const names = tokens.map((token) => token.name)

  function submit(event: FormEvent) {
    event.preventDefault()
    const scope = scopeOf(name.trim(), names)
    setFault(
      scope === undefined ? 'No name of the ledger begins so, by whole segments.' : undefined,
    )
    if (scope === undefined) return
    void navigate(paths.rules(system, `?of=${encodeURIComponent(scopeText(scope))}`))
  }

  return (
    <form onSubmit={submit} className="flex flex-wrap items-end gap-x-20 gap-y-12 pt-22 pb-44">
      <NameBox
        label="Narrow on a prefix, or on one token"
        value={name}
        names={prefixesOf(names)}
        fault={fault}
        onChange={setName}
        className="w-full wide:w-300"
      />
      <WordButton type="submit">Open its rules</WordButton>
    </form>
  )
}

/** A whole name is the token; what begins names is a prefix. */
function scopeOf(name: string, names: readonly string[]): Scope | undefined {
  if (name === '') return undefined
  if (names.some((each) => each.startsWith(`${name}.`))) return { kind: 'prefix', prefix: name }
  return names.includes(name) ? { kind: 'token', name } : undefined
}

/** Every prefix and every name, in the order of the ledger. */
function prefixesOf(names: readonly string[]): string[] {
  const all = new Set<string>()
  for (const name of names) {
    const segments = name.split('.')
    for (const at of segments.keys()) all.add(segments.slice(0, at + 1).join('.'))
  }
  return [...all]
}
