import type { Fault } from '#shared/contracts/problems.ts'
import type { Weakening, WeakeningCode } from '#shared/checks/weakening-kinds.ts'

/** Who writes: a person in a role, or a key, which is nobody whoever owns it. */
export interface Writer {
  readonly kind: 'user' | 'key'
  readonly role: 'engineer' | 'maintainer' | 'accessibility-lead' | 'admin'
}

/** The edits of an accessibility lead: exemptions, levels, and which themes gate. */
const LEADS_OWN: readonly WeakeningCode[] = ['exempted', 'level-lowered', 'gating-stopped']

/** What of it takes somebody else's approval. */
export function unapproved(weakenings: readonly Weakening[], { kind, role }: Writer): Weakening[] {
  if (kind === 'user' && role === 'admin') return []
  const own = kind === 'user' && role === 'accessibility-lead' ? LEADS_OWN : []
  return weakenings.filter(({ code }) => !own.includes(code))
}

/** Each as a fault of the request. */
export const weakeningFaults = (
  weakenings: readonly Weakening[],
  pointerOf: (weakening: Weakening) => string | undefined,
): Fault[] =>
  weakenings.map((weakening) => {
    const pointer = pointerOf(weakening)
    const { detail, code } = weakening
    return { ...(pointer === undefined ? {} : { pointer }), detail, code }
  })

/** An import that replaces asks for approval whatever it does, unless there was nothing before it. */
export const REPLACING: Weakening = {
  code: 'import-replaces',
  item: { kind: 'system' },
  detail: 'The import replaces what stands',
}
