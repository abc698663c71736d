import { useSuspenseQuery } from '@tanstack/react-query'
import { paths } from '#console/app/paths.ts'
import { BreachAssignee } from '#console/features/breaches/breach-assignee.tsx'
import { BreachComment } from '#console/features/breaches/breach-comment.tsx'
import { BreachHistory } from '#console/features/breaches/breach-history.tsx'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { mayDo } from '#console/features/session/session.queries.ts'
import { useMe } from './account-items.tsx'
import { RefusedWrite } from './refused-write.tsx'
import { useWhoMay } from './who-may.ts'

/** An opened breach: its history, who is on it, and a comment to add. */
export function OpenedBreach({ system, id }: { system: string; id: string }) {
  const me = useMe()
  const who = useWhoMay(system)
  const { data: members } = useSuspenseQuery(memberQueries.all(system))
  const obstacle = mayDo(me, system, 'breaches:assign')
    ? undefined
    : `Assigning takes an accessibility lead.${who.oneOf('accessibility-lead')}`
  return (
    <BreachHistory
      system={system}
      id={id}
      tokenHref={(name) => paths.token(system, name)}
      handling={(breach) => (
        <BreachAssignee
          system={system}
          breach={breach}
          people={members}
          self={me.user.id}
          obstacle={obstacle}
          refused={(refusal) => <RefusedWrite refusal={refusal} />}
        />
      )}
    >
      <BreachComment
        system={system}
        breach={id}
        writer={me.user.id}
        refused={(refusal) => <RefusedWrite refusal={refusal} />}
      />
    </BreachHistory>
  )
}
