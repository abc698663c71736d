import { useSuspenseQuery } from '@tanstack/react-query'
import { productsOf } from '#console/features/pairs/pair-filter.ts'
import { PairFields } from '#console/features/pairs/pair-fields.tsx'
import { pairQueries } from '#console/features/pairs/pairs.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { faultAt, type WriteRefusal } from '#console/lib/refusal.ts'
import type { PairEdit } from './pair-edit.ts'

/** The members of a pair as fields, faults beside what they are about. */
export function PairMembers({
  system,
  edit,
  refusal,
}: {
  system: string
  edit: PairEdit
  refusal: WriteRefusal | undefined
}) {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: pairs } = useSuspenseQuery(pairQueries.all(system))
  return (
    <PairFields
      fields={edit.fields}
      tokens={tokens.map(({ name }) => name)}
      themes={themes.map(({ key }) => key)}
      groups={[...new Set(pairs.flatMap(({ anyOf }) => anyOf ?? []))].sort()}
      products={productsOf(pairs)}
      systemLevel={settings.level}
      faultAt={(pointer) =>
        edit.isEdited
          ? (edit.faults.find((fault) => (fault.pointer ?? '').startsWith(pointer))?.detail ??
            faultAt(refusal, pointer))
          : undefined
      }
      onChange={edit.put}
    />
  )
}
