import { Fragment, type ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { type RowLinkProps, useRowWalk } from '#console/ui/row-walk.ts'
import { useWindowWidth } from '#console/ui/window-size.ts'
import { countInWords } from '#shared/checks/finding-words.ts'
import { DERIVED_STATES } from '#shared/checks/model.ts'
import { type ScopedRules, scopeInWords, scopeText } from './rule-scopes.ts'
import { stateRuleInWords, themeRuleInWords } from './rule-words.ts'

/** From this many px on, what the rules say has columns of its own. */
const WIDE = 880

/** Every scope that has rules, from wide to narrow; one may be opened. */
export function RulesTable({
  scopes,
  opened,
  href,
  under,
}: {
  scopes: readonly ScopedRules[]
  /** The address text of the opened one. */
  opened: string | undefined
  href: (scope: string) => string
  under: ReactNode
}) {
  const walk = useRowWalk(scopes.length)
  const isWide = useWindowWidth() >= WIDE
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the row links inside, which are operable
    <div ref={walk.container} onKeyDown={walk.onKeyDown} className="ledger mt-14">
      <table aria-label="Rules">
        <thead>
          <tr>
            <th className={isWide ? 'w-[26%]' : ''}>For</th>
            {isWide && <th>A state is</th>}
            {isWide && <th>In a theme its colours</th>}
            <th className="number w-70">Tokens</th>
          </tr>
        </thead>
        <tbody>
          {scopes.map((scoped, index) => {
            const text = scopeText(scoped.scope)
            return (
              <Fragment key={text}>
                <ScopeRow
                  scoped={scoped}
                  isOpened={text === opened}
                  isWide={isWide}
                  href={href(text)}
                  link={walk.rowLink(index)}
                />
                {text === opened && (
                  <tr data-under>
                    <td colSpan={isWide ? 4 : 2}>{under}</td>
                  </tr>
                )}
              </Fragment>
            )
          })}
        </tbody>
      </table>
    </div>
  )
}

function ScopeRow({
  scoped: { scope, rules, governs },
  isOpened,
  isWide,
  href,
  link,
}: {
  scoped: ScopedRules
  isOpened: boolean
  isWide: boolean
  href: string
  link: RowLinkProps
}) {
  const states = <StateLines states={rules.states} />
  const themes =
    scope.kind === 'system' ? (
      'follow the rule of the theme'
    ) : (
      <ThemeLines themes={rules.themes ?? {}} />
    )
  return (
    <tr data-opened={isOpened || undefined}>
      <td className="row-start py-6! pr-12! align-top!">
        <Link
          to={href}
          preventScrollReset
          {...link}
          aria-expanded={isOpened}
          className="font-medium break-words"
        >
          {scopeInWords(scope)}
        </Link>
        <span className="block text-13 font-normal text-ink-soft">{kindInWords(scope.kind)}</span>
        {!isWide && (
          <span className="mt-4 block text-13 font-normal">
            {states}
            <span className="block text-ink-soft">{themes}</span>
          </span>
        )}
      </td>
      {isWide && <td className="py-6! pr-12! align-top! font-normal!">{states}</td>}
      {isWide && <td className="py-6! pr-12! align-top! font-normal! text-ink-soft">{themes}</td>}
      <td className="number figures py-6! align-top! font-normal!">{governs.length}</td>
    </tr>
  )
}

function kindInWords(kind: ScopedRules['scope']['kind']): string {
  if (kind === 'system') return 'what no narrower rule says'
  return kind === 'prefix' ? 'every name that begins so' : 'this token alone'
}

function StateLines({ states = {} }: { states?: ScopedRules['rules']['states'] }) {
  return DERIVED_STATES.map((state) => {
    const words = stateRuleInWords(states[state])
    return (
      words !== '' && (
        <span key={state} className="block">
          <span className="text-ink-soft">{state}</span> {words}
        </span>
      )
    )
  })
}

function ThemeLines({ themes }: { themes: NonNullable<ScopedRules['rules']['themes']> }) {
  return Object.entries(themes).map(([key, rule]) => (
    <span key={key} className="block">
      <span className="font-medium text-ink">{key}</span> {themeRuleInWords(rule)}
    </span>
  ))
}

/** Which tokens come under a scope, and that some of them are narrowed further. */
export function Governed({
  governs,
  narrower,
  href,
}: {
  governs: readonly string[]
  /** Scopes within it that have rules of their own. */
  narrower: readonly string[]
  href: (name: string) => string
}) {
  return (
    <section className="pt-22">
      <h2 className="text-16 font-semibold">Governs {countInWords(governs.length)} tokens</h2>
      {narrower.length > 0 && (
        <p className="text-13 text-ink-soft">
          Narrower rules go before it for {narrower.slice(0, 12).join(', ')}
          {narrower.length > 12 && ` and ${narrower.length - 12} more`}.
        </p>
      )}
      <ul className="mt-8 max-h-240 overflow-y-auto columns-[200px] gap-x-28 text-13">
        {governs.map((name) => (
          <li key={name} className="flex min-h-24 items-center break-words">
            <Link to={href(name)} className="min-w-0 py-3 hover:underline">
              {name}
            </Link>
          </li>
        ))}
      </ul>
    </section>
  )
}
