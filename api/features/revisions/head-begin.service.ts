import { checkSystem } from '#shared/checks/check-system.ts'
import type { SystemSettings } from '#shared/checks/model.ts'
import type { GovernedSystem } from '#shared/checks/governed-model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { Caller } from '#api/caller.ts'
import type { Repositories } from '#api/repositories.ts'
import { stateDigest } from './state-digest.ts'
import { changesBetween } from './version-changes.rules.ts'

/** A system whose first revision is to be made. */
export interface Beginning {
  readonly systemId: string
  readonly settings: SystemSettings
  readonly caller: Caller
}

/** Makes revision 0: settings, and nothing else yet. Part of the transaction that makes the system. */
export function createHeadBeginService() {
  return {
    async begin(
      { heads, versions }: Pick<Repositories, 'heads' | 'versions'>,
      { systemId, settings, caller }: Beginning,
    ): Promise<void> {
      const model = { ...NOTHING, settings }
      const checked = checkSystem(model)
      if (!checked.ok) throw new TypeError('A system without tokens resolves')
      const { verdict, counts, engine } = verdictOf(checked.evaluation)
      await heads.begin(systemId)
      const changes = { ...changesBetween(model, model), settings }
      await versions.write({ systemId, revision: 0 }, changes)
      await heads.addRevision({
        systemId,
        number: 0,
        origin: 'created',
        authorUserId: caller.userId,
        verdict,
        counts,
        engineVersion: engine.version,
        gamutMap: engine.gamutMap,
        ruleSet: engine.ruleSet,
        digest: stateDigest(model),
      })
    },
  }
}
export type HeadBeginService = ReturnType<typeof createHeadBeginService>

const NOTHING: Omit<GovernedSystem, 'settings'> = {
  states: {},
  prefixes: [],
  themes: [],
  tokens: [],
  pairs: [],
}
