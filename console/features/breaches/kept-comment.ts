import { useState } from 'react'
import * as z from 'zod'

const keptSchema = z.object({ text: z.string(), idempotencyKey: z.string() })

/** A comment that is being written: it outlives closing the row, a reload, and signing in again in this tab. */
export type KeptComment = z.infer<typeof keptSchema>

const newComment = (): KeptComment => ({ text: '', idempotencyKey: crypto.randomUUID() })

/** The comment kept for a breach by whoever writes it. */
export function useKeptComment(writer: string, breach: string) {
  const place = `comment/${writer}/${breach}`
  const [comment, setComment] = useState(() => readKept(place) ?? newComment())
  const keep = (next: KeptComment) => {
    setComment(next)
    if (next.text === '') sessionStorage.removeItem(place)
    else sessionStorage.setItem(place, JSON.stringify(next))
  }
  return {
    comment,
    write: (text: string) => keep({ ...comment, text }),
    drop: () => keep(newComment()),
  }
}

function readKept(place: string): KeptComment | undefined {
  try {
    const read = keptSchema.safeParse(JSON.parse(sessionStorage.getItem(place) ?? ''))
    return read.success ? read.data : undefined
  } catch {
    return undefined
  }
}
