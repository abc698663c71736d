import type { PairDraft, PairFields } from './pair-draft.ts'
import { fieldsOf } from './pair-draft.ts'
import { backdropInWords, statesInWords, themesInWords, wordsOfUse } from './pair-words.ts'
import type { PairWire } from '#shared/contracts/pairs.contract.ts'

const MEMBERS: readonly (readonly [keyof PairFields, string])[] = [
  ['foreground', 'Foreground'],
  ['background', 'Background'],
  ['use', 'Use'],
  ['relation', 'Relation'],
  ['backdrop', 'Backdrop'],
  ['states', 'States'],
  ['themes', 'Themes'],
  ['level', 'Level'],
  ['minimum', 'Minimum'],
  ['anyOf', 'Group'],
  ['product', 'Product'],
  ['exempt', 'Exemption'],
  ['reason', 'Its reason'],
]

/** Members in which a pair as it is now and as it is drafted here differ, in words. */
export function pairVersions(
  now: PairWire,
  draft: PairDraft,
): { member: string; now: string; yours: string }[] {
  const standing = fieldsOf(now)
  const yours = { ...standing, ...draft }
  return MEMBERS.flatMap(([field, member]) =>
    field in draft ? [{ member, now: inWords(standing, field), yours: inWords(yours, field) }] : [],
  )
}

function inWords(fields: PairFields, field: keyof PairFields): string {
  switch (field) {
    case 'use':
      return wordsOfUse(fields.use)
    case 'states':
      return statesInWords(fields.states)
    case 'themes':
      return themesInWords(fields.themes)
    case 'backdrop':
      return backdropInWords(fields.backdrop === 'unknown' ? 'unknown' : [...fields.backdrop])
    case 'level':
      return fields.level === 'system' ? 'the system’s' : fields.level
    default:
      return fields[field] === '' ? 'none' : fields[field]
  }
}
