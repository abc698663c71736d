import { useMutation, useQueryClient } from '@tanstack/react-query'
import type { FormEvent, ReactNode } from 'react'
import { type WriteRefusal, writeRefusal } from '#console/lib/refusal.ts'
import { WordButton } from '#console/ui/button.tsx'
import { LineArea } from '#console/ui/line-area.tsx'
import { MOST_COMMENT_CHARACTERS } from '#shared/contracts/breaches.contract.ts'
import { addComment, breachQueries } from './breaches.queries.ts'
import { useKeptComment } from './kept-comment.ts'

/** A comment on a breach; until the service has it, it is kept here. */
export function BreachComment({
  system,
  breach,
  writer,
  refused,
}: {
  system: string
  breach: string
  /** Id of who writes. */
  writer: string
  /** How a refusal is told. */
  refused: (refusal: WriteRefusal) => ReactNode
}) {
  const client = useQueryClient()
  const { comment, write, drop } = useKeptComment(writer, breach)
  const adding = useMutation({
    mutationFn: addComment,
    onSuccess: async () => {
      drop()
      await client.invalidateQueries({ queryKey: breachQueries.one(system, breach).queryKey })
    },
  })
  const isEmpty = comment.text.trim() === ''
  function submit(event: FormEvent) {
    event.preventDefault()
    if (isEmpty || adding.isPending) return
    adding.mutate({ system, id: breach, ...comment, text: comment.text.trim() })
  }
  return (
    <form onSubmit={submit} className="mt-14">
      <LineArea
        label="Add a comment"
        value={comment.text}
        maxLength={MOST_COMMENT_CHARACTERS}
        onChange={(event) => write(event.target.value)}
      />
      <p className="mt-8 flex items-baseline justify-between gap-x-20">
        <WordButton type="submit" disabled={isEmpty} aria-busy={adding.isPending}>
          {adding.isPending ? 'Adding' : 'Add it to the history'}
        </WordButton>
        {comment.text.length > MOST_COMMENT_CHARACTERS - 500 && (
          <span className="text-13 text-ink-soft">
            {MOST_COMMENT_CHARACTERS - comment.text.length} characters left
          </span>
        )}
      </p>
      {adding.isError && refused(writeRefusal(adding.error))}
    </form>
  )
}
