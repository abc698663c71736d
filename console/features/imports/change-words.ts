import { valueText } from '#console/lib/value-words.ts'
import { countOf } from '#shared/checks/finding-words.ts'
import type { ValueInput } from '#shared/contracts/fields.ts'
import type { ImportChangeWire, ImportWire } from '#shared/contracts/import-outcome.ts'

/** One thing of an item that differs; a side that does not have it has none. */
export interface ChangedMember {
  /** `value`, `values dark hover` */
  readonly member: string
  readonly before?: string
  readonly after?: string
}

/** Members that say which item it is and no more, or what every item says that nothing was said of. */
const UNTOLD = new Set(['id', 'name', 'position', 'etag'])
const UNSAID = new Set(['', 'false'])

/** What of an item an import adds, edits or removes, member by member. */
export function changedMembers({
  item,
  operation,
  before,
  after,
}: ImportChangeWire): ChangedMember[] {
  const sides = [before, after].map(
    (members = {}) => new Map(leavesOf((item === 'other' && members.document) || members, [])),
  )
  const [then = new Map<string, string>(), now = new Map<string, string>()] = sides
  const isEdited = operation === 'edited'
  return [...new Set([...then.keys(), ...now.keys()])].flatMap((member) => {
    const [was, is] = [then.get(member), now.get(member)]
    if (was === is) return []
    if (!isEdited && (UNTOLD.has(member) || UNSAID.has(was ?? is ?? ''))) return []
    return {
      member,
      ...(was === undefined ? {} : { before: was === '' ? 'none' : was }),
      ...(is === undefined ? {} : { after: is === '' ? 'none' : is }),
    }
  })
}

function leavesOf(value: unknown, path: readonly string[]): [string, string][] {
  if (typeof value !== 'object' || value === null) return [[path.join(' '), wordOf(value)]]
  if ('colorSpace' in value || 'derive' in value) {
    return [[path.join(' '), valueText(value as ValueInput)]]
  }
  if (Array.isArray(value) && value.every((each) => typeof each !== 'object')) {
    return [[path.join(' '), value.map(wordOf).join(', ')]]
  }
  return Object.entries(value).flatMap(([name, member]) => leavesOf(member, [...path, name]))
}

const wordOf = (value: unknown): string => (value === null ? 'none' : String(value))

const ITEM_WORDS = {
  token: 'token',
  pair: 'pair',
  theme: 'theme',
  'distinct-set': 'distinct set',
  rules: 'rules',
  settings: 'settings',
  other: 'what is no colour',
} as const satisfies Record<ImportChangeWire['item'], string>

const OPERATION_WORDS = { added: 'added', edited: 'changed', removed: 'removed' } as const

/** `token, added`; what there is one of says its kind by its name. */
export const changeInWords = ({ item, operation, name }: ImportChangeWire): string =>
  item === name ? OPERATION_WORDS[operation] : `${ITEM_WORDS[item]}, ${OPERATION_WORDS[operation]}`

/** What an item is called; what there is one of by its kind. */
export const changeName = ({ item, name }: ImportChangeWire): string =>
  item === name ? ITEM_WORDS[item] : name

/** `Tokens: two added, one changed, none removed, 116 as they are.`, for each kind that is there at all. */
export function talliesInWords({ counts }: ImportWire): string[] {
  const kinds = [
    ['Tokens', counts.tokens],
    ['Pairs', counts.pairs],
    ['Themes', counts.themes],
    ['Distinct sets', counts.distinctSets],
  ] as const
  return kinds.flatMap(([kind, { added, edited, removed, unchanged }]) => {
    if (added + edited + removed + unchanged === 0) return []
    const parts = [
      [added, 'added'],
      [edited, 'changed'],
      [removed, 'removed'],
      [unchanged, 'as before'],
    ] as const
    const said = parts.filter(([count]) => count > 0)
    return `${kind}: ${said.map(([count, word]) => `${figure(count)} ${word}`).join(', ')}`
  })
}

const figure = (count: number): string => count.toLocaleString('en-GB')

/** `no newly breaching, eight newly passing, one as before` */
export function checkInWords({ effect, check }: ImportWire): string {
  const opened = effect.opened.length
  const asBefore = Math.max(0, check.counts.breach - opened)
  return [
    `${countOf(opened, 'newly breaching', 'newly breaching')}`,
    `${countOf(effect.resolved.length, 'newly passing', 'newly passing')}`,
    `${countOf(asBefore, 'breach as before', 'breaches as before')}`,
  ].join(', ')
}
