import { type JsonObject, objectOf, pointerTo } from '#shared/formats/dtcg-fault.ts'

/** Tells where in a file something stands that was put together from its parts. */
export type OriginOf = (pointer: string) => string

/**
 * A resolver file is read choice by choice, each choice a document put together from the same objects. A
 * pointer into such a document leads, by the last object of the file that it passes, into the file.
 */
export function originsOf(file: unknown): (document: JsonObject) => OriginOf {
  const pointers = new Map<unknown, string>()
  const waiting: [unknown, string][] = [[file, '']]
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const [value, pointer] = next
    if (typeof value !== 'object' || value === null || pointers.has(value)) continue
    pointers.set(value, pointer)
    for (const [name, member] of Object.entries(value)) {
      waiting.push([member, pointerTo(pointer, name)])
    }
  }
  return (document) => (pointer) => {
    const path = pointer.split('/').slice(1)
    let place: unknown = document
    let known = ''
    let from = 0
    path.forEach((segment, at) => {
      const name = segment.replaceAll('~1', '/').replaceAll('~0', '~')
      place = objectOf(place)?.[name] ?? (Array.isArray(place) ? place[Number(name)] : undefined)
      const origin = pointers.get(place)
      if (origin === undefined) return
      known = origin
      from = at + 1
    })
    return [known, ...path.slice(from)].join('/')
  }
}
