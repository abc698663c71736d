import type { Relation } from './relation-words.ts'

/** `on surface.night`, `under action.board.text`, `as border.chosen, on surface.chosen` */
export function RelationPhrase({
  relation,
  nameOf,
}: {
  relation: Relation
  nameOf: (id: string) => string
}) {
  const { word, other, through } = relation
  return (
    <>
      {through !== undefined && `as ${nameOf(through)}, `}
      {word} <span className="font-medium">{nameOf(other)}</span>
    </>
  )
}
