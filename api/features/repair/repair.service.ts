import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import { nearestPassing } from '#shared/checks/nearest-passing.ts'
import { repairPlan } from '#shared/checks/repair-plan.ts'
import { presentNearest, presentPlan } from './repair.presenter.ts'

export interface RepairDeps {
  readonly heads: Pick<HeadsService, 'current'>
}

export type RepairService = ReturnType<typeof createRepairService>

const lockedIn = ({ model }: Head): ReadonlySet<string> =>
  new Set(model.tokens.filter(({ locked }) => locked).map(({ id }) => id))

/** Looks for colours with which what breaches on the head would pass; writes nothing. */
export function createRepairService({ heads }: RepairDeps) {
  return {
    async nearest(system: SystemAccess, name: string, budget: number) {
      const head = await heads.current(system.id)
      const token = head.index.tokensByName.get(name)
      if (token === undefined) throw new AppError('not-found', { detail: `No token ${name}` })
      const options = { locked: lockedIn(head), budget }
      return presentNearest(head.evaluation, nearestPassing(head.evaluation, token.id, options))
    },

    async plan(system: SystemAccess, budget: number) {
      const head = await heads.current(system.id)
      const options = { locked: lockedIn(head), budget }
      return presentPlan(head.evaluation, repairPlan(head.evaluation, options))
    },
  }
}
