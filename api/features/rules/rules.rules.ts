import type * as z from 'zod'
import type { ModelFault, PrefixRules } from '#shared/checks/model.ts'
import { tokenNameSchema } from '#shared/contracts/fields.ts'
import { type Decision, refuseFaults, type SystemIndex } from '#shared/contracts/governed-system.ts'
import type { putRulesBody } from '#shared/contracts/rules.contract.ts'
import { type Reading, readRuleScope, readStateRules } from '#shared/contracts/wire-values.ts'

export type PutRulesBody = z.output<typeof putRulesBody>

/** The rules of the system and of its name prefixes, replaced whole. */
export function decideReplace(index: SystemIndex, body: PutRulesBody): Decision {
  const reading: Reading = { names: index.names, faults: [] }
  const states = readStateRules(body.states, '/states', reading)
  const prefixes = body.prefixes.map(({ prefix, ...scope }, at): PrefixRules => {
    const pointer = `/prefixes/${at}`
    if (!tokenNameSchema.safeParse(prefix).success) {
      reading.faults.push({ pointer: `${pointer}/prefix`, detail: 'Whole name segments only' })
    }
    if (body.prefixes.findIndex((other) => other.prefix === prefix) !== at) {
      const detail = `The rules of ${prefix} are given twice`
      reading.faults.push({ pointer: `${pointer}/prefix`, detail })
    }
    return { prefix, ...readRuleScope(scope, pointer, reading) }
  })
  if (reading.faults.length > 0) return refuseFaults(reading.faults)
  return { ok: true, edits: { states, prefixes }, pointerOf: pointersOf(index, prefixes) }
}

/** A fault of a token lies in the narrowest prefix that covers it, else in the rules of the system. */
function pointersOf({ tokensById }: SystemIndex, prefixes: readonly PrefixRules[]) {
  return (fault: ModelFault): string | undefined => {
    const name = fault.token === undefined ? undefined : tokensById.get(fault.token)?.name
    if (name === undefined) return undefined
    let narrowest = -1
    prefixes.forEach(({ prefix }, at) => {
      const covers = name === prefix || name.startsWith(`${prefix}.`)
      if (covers && prefix.length > (prefixes[narrowest]?.prefix.length ?? 0)) narrowest = at
    })
    return narrowest < 0 ? '/states' : `/prefixes/${narrowest}`
  }
}
