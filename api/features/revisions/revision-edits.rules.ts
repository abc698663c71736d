import type { revisionSchema } from '#shared/contracts/revisions.contract.ts'
import type { ModelNames } from '#shared/contracts/wire-values.ts'
import type * as z from 'zod'

export type RevisionEdit = z.infer<typeof revisionSchema>['edits'][number]

/** A version that a revision began or ended. */
export interface TouchedVersion {
  readonly item: RevisionEdit['item']
  readonly id: string
  readonly name: string
  readonly fromRevision: number
}

interface Span {
  readonly fromRevision: number
}

export interface Touched {
  readonly tokens: readonly (Span & { readonly id: string; readonly name: string })[]
  readonly pairs: readonly (Span & {
    readonly id: string
    readonly foreground: string
    readonly background: string
  })[]
  readonly themes: readonly (Span & { readonly id: string; readonly name: string })[]
  readonly rules: readonly (Span & { readonly prefix: string })[]
  readonly settings: readonly Span[]
  readonly distinctSets: readonly (Span & { readonly id: string; readonly name: string })[]
  /** What files brought besides. */
  readonly others: readonly Span[]
}

/**
 * What a revision did, told from the versions at its number alone: one that begins where none ends was
 * added, one that ends where none begins was removed, and both together are an edit.
 * @param names of the revision; tokens that it removed are called what their last version says
 */
export function editsOf(touched: Touched, number: number, names: ModelNames): RevisionEdit[] {
  const byItem = new Map<string, { begun?: TouchedVersion; ended?: TouchedVersion }>()
  for (const version of versionsOf(touched, names)) {
    const key = `${version.item} ${version.id} ${version.item === 'rules' ? version.name : ''}`
    const ends = byItem.get(key) ?? {}
    byItem.set(key, {
      ...ends,
      [version.fromRevision === number ? 'begun' : 'ended']: version,
    })
  }
  return [...byItem.values()].flatMap(({ begun, ended }) => {
    const shown = begun ?? ended
    if (shown === undefined) return []
    const operation = begun === undefined ? 'removed' : ended === undefined ? 'added' : 'edited'
    return { item: shown.item, operation, id: shown.id, name: shown.name }
  })
}

function versionsOf(touched: Touched, names: ModelNames): TouchedVersion[] {
  const gone = new Map(touched.tokens.map(({ id, name }) => [id, name]))
  const nameOf = (id: string) => {
    const name = names.tokenName(id)
    return name === id ? (gone.get(id) ?? id) : name
  }
  return [
    ...touched.tokens.map((version) => ({ item: 'token' as const, ...version })),
    ...touched.pairs.map(({ foreground, background, ...version }) => ({
      item: 'pair' as const,
      ...version,
      name: `${nameOf(foreground)} on ${nameOf(background)}`,
    })),
    ...touched.themes.map((version) => ({ item: 'theme' as const, ...version })),
    ...touched.distinctSets.map((version) => ({ item: 'distinct-set' as const, ...version })),
    ...touched.rules.map(({ prefix, fromRevision }) => ({
      item: 'rules' as const,
      id: 'rules',
      name: prefix === '' ? 'states' : prefix,
      fromRevision,
    })),
    ...touched.settings.map(({ fromRevision }) => ({
      item: 'settings' as const,
      id: 'settings',
      name: 'settings',
      fromRevision,
    })),
    ...touched.others.map(({ fromRevision }) => ({
      item: 'other' as const,
      id: 'other',
      name: 'other',
      fromRevision,
    })),
  ]
}
