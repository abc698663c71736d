import { useQuery } from '@tanstack/react-query'
import { checkSystem } from '#shared/checks/check-system.ts'
import { modelFromWire } from '#shared/contracts/system-model.ts'
import { loadWholeSystem } from './whole-system.ts'

/** The head, measured in the browser by the engine that the service measures with. */
export function useEvaluation(system: string, revision: number) {
  return useQuery({
    queryKey: ['system', system, 'evaluation', revision],
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: 60_000,
    // Maps and typed arrays: handed on as they are.
    structuralSharing: false,
    queryFn: async () => {
      const checked = checkSystem(modelFromWire(await loadWholeSystem(system)))
      if (!checked.ok)
        throw new TypeError(`The head does not resolve: ${checked.faults[0]?.detail}`)
      return checked.evaluation
    },
  })
}
