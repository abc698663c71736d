import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import type { WireNames } from '#shared/contracts/wire-values.ts'
import type { FileTheme, FileToken, ImportFile } from './import-file.ts'

/** Makes ids for what is new; the same item gets the same one however often it is asked. */
export type ItemIds = (kind: 'tok' | 'thm' | 'pair' | 'set', key: string) => string

/** Which item of the system each item of the file is: the one of its id, else the one of its name, else a new one. */
export interface Identities {
  readonly tokens: ReadonlyMap<FileToken, string>
  readonly themes: ReadonlyMap<FileTheme, string>
  /** What the system will know by which name. */
  readonly names: WireNames
  /** Tokens and themes of the system that the file does not speak of. */
  readonly unnamedTokens: ReadonlySet<string>
  readonly unnamedThemes: ReadonlySet<string>
  readonly faults: readonly Fault[]
}

interface Named {
  readonly pointer: string
  readonly id?: string
}

interface Lookup {
  readonly byId: ReadonlyMap<string, { readonly id: string }>
  readonly byName: ReadonlyMap<string, { readonly id: string }>
  readonly newId: (name: string) => string
}

/** @param keeps whether what the file does not speak of stays */
export function identify(
  index: SystemIndex,
  file: ImportFile,
  { keeps, ids }: { readonly keeps: boolean; readonly ids: ItemIds },
): Identities {
  const tokens = matched(file.tokens, ({ name }) => name, {
    byId: index.tokensById,
    byName: index.tokensByName,
    newId: (name) => ids('tok', name),
  })
  const themes = matched(file.themes ?? [], ({ key }) => key, {
    byId: index.themesById,
    byName: index.themesByKey,
    newId: (key) => ids('thm', key),
  })
  const unnamedTokens = idsLeft(index.model.tokens, tokens.ids)
  const unnamedThemes = idsLeft(index.model.themes, themes.ids)
  const keepsThemes = keeps || file.themes === undefined
  const tokenIds = new Map<string, string>()
  const themeIds = new Map<string, string>()
  for (const { id, name } of keeps ? index.model.tokens : []) {
    if (unnamedTokens.has(id)) tokenIds.set(name, id)
  }
  for (const { id, key } of keepsThemes ? index.model.themes : []) {
    if (unnamedThemes.has(id)) themeIds.set(key, id)
  }
  const kept = keeps ? index.model.tokens.filter(({ id }) => unnamedTokens.has(id)) : []
  for (const [{ name }, id] of tokens.ids) tokenIds.set(name, id)
  for (const [{ key }, id] of themes.ids) themeIds.set(key, id)
  return {
    tokens: tokens.ids,
    themes: themes.ids,
    names: { tokenId: (name) => tokenIds.get(name), themeId: (key) => themeIds.get(key) },
    unnamedTokens,
    unnamedThemes,
    faults: [...tokens.faults, ...themes.faults, ...clashingNames(file.tokens, kept)],
  }
}

function matched<Item extends Named>(
  items: readonly Item[],
  nameOf: (item: Item) => string,
  { byId, byName, newId }: Lookup,
) {
  const ids = new Map<Item, string>()
  const taken = new Set<string>()
  const faults: Fault[] = []
  const take = (item: Item, id: string) => {
    ids.set(item, id)
    taken.add(id)
  }
  for (const item of items) {
    if (item.id === undefined || !byId.has(item.id)) continue
    if (taken.has(item.id)) {
      faults.push({ pointer: item.pointer, detail: `The id ${item.id} is given twice` })
    } else take(item, item.id)
  }
  for (const item of items) {
    if (ids.has(item)) continue
    const standing = byName.get(nameOf(item))?.id
    take(item, standing === undefined || taken.has(standing) ? newId(nameOf(item)) : standing)
  }
  return { ids: new Map(items.map((item) => [item, ids.get(item) ?? ''])), faults }
}

const idsLeft = (standing: readonly { readonly id: string }[], ids: ReadonlyMap<Named, string>) => {
  const spokenOf = new Set(ids.values())
  return new Set(standing.flatMap(({ id }) => (spokenOf.has(id) ? [] : [id])))
}

/** Names equal after NFC are one name to a reader, and a token cannot hold another. */
function clashingNames(
  given: readonly FileToken[],
  kept: readonly { readonly name: string }[],
): Fault[] {
  const holders = new Map<string, string>()
  const groups = new Map<string, string>()
  const faults: Fault[] = []
  const enter = (name: string) => {
    const normal = name.normalize('NFC')
    holders.set(normal, name)
    for (const group of groupsOf(normal)) groups.set(group, name)
  }
  for (const { name } of kept) enter(name)
  for (const { name, pointer } of given) {
    const normal = name.normalize('NFC')
    const twin = holders.get(normal)
    const above = groupsOf(normal).find((group) => holders.has(group))
    const member = groups.get(normal)
    if (twin !== undefined) faults.push({ pointer, detail: twinDetail(name, twin) })
    if (above !== undefined) {
      faults.push({ pointer, detail: `${holders.get(above)} is a token, so it holds none` })
    }
    if (member !== undefined) {
      faults.push({ pointer, detail: `${name} is a group: ${member} is in it` })
    }
    enter(name)
  }
  return faults
}

const twinDetail = (name: string, twin: string) =>
  name === twin
    ? `The name ${name} is given twice`
    : `Another token has the name ${name}, composed differently`

/** The groups that a name lies in, outermost first. */
const groupsOf = (name: string): string[] => {
  const groups: string[] = []
  for (let dot = name.indexOf('.'); dot >= 0; dot = name.indexOf('.', dot + 1)) {
    groups.push(name.slice(0, dot))
  }
  return groups
}
