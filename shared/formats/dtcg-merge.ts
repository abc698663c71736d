import { isToken } from './dtcg-document.ts'
import { type JsonObject, objectOf } from './dtcg-fault.ts'

/**
 * Lays token documents over each other: groups merge, a later token replaces an earlier one whole.
 * Linear, and without recursion.
 * @param documents From the weakest to the strongest; none is changed.
 * @see https://www.designtokens.org/tr/2025.10/resolver/#resolution-logic
 */
export function mergedDocument(documents: readonly JsonObject[]): JsonObject {
  const root = new Map<string, unknown>()
  const waiting = documents.map((from) => ({ into: root, from })).reverse()
  for (let step = waiting.pop(); step; step = waiting.pop()) {
    const { into, from } = step
    const groups: typeof waiting = []
    for (const [name, value] of Object.entries(from)) {
      const group = groupOf(name, value)
      if (!group) {
        into.set(name, value)
        continue
      }
      const held = into.get(name)
      const child: Map<string, unknown> = held instanceof Map ? held : new Map()
      into.set(name, child)
      groups.push({ into: child, from: group })
    }
    for (const group of groups.reverse()) waiting.push(group)
  }
  return asObject(root)
}

function groupOf(name: string, value: unknown): JsonObject | undefined {
  const object = objectOf(value)
  return object && !isToken(object) && !name.startsWith('$') ? object : undefined
}

/** Turns the tree of maps into plain objects, leaves first. */
function asObject(root: Map<string, unknown>): JsonObject {
  const maps = [root]
  for (const map of maps) {
    for (const value of map.values()) if (value instanceof Map) maps.push(value)
  }
  const objects = new Map<unknown, JsonObject>()
  for (const map of maps.reverse()) {
    const members = [...map].map(([name, value]) => [name, objects.get(value) ?? value] as const)
    objects.set(map, Object.fromEntries(members))
  }
  return objects.get(root)!
}
