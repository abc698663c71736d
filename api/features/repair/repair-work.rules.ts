import { checkSystem } from '#shared/checks/check-system.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { SystemModel } from '#shared/checks/model.ts'
import {
  type NearestPassing,
  nearestPassing,
  type NearestPassingOptions,
} from '#shared/checks/nearest-passing.ts'
import { type RepairPlan, repairPlan, type RepairPlanOptions } from '#shared/checks/repair-plan.ts'
import { type MendAsk, type Mended, mendFindings } from './mend-findings.rules.ts'

type Sent<Options> = Omit<Options, 'onSpent'>

/** What can be searched, and what comes of it; both are plain data. */
export interface RepairWork {
  readonly plan: { readonly options: Sent<RepairPlanOptions>; readonly answer: RepairPlan }
  readonly nearest: {
    readonly options: Sent<NearestPassingOptions> & { readonly token: string }
    readonly answer: NearestPassing
  }
  readonly mend: { readonly options: Sent<MendAsk>; readonly answer: Mended }
}

/** One search in a system. */
export type RepairAsk = {
  readonly [Kind in keyof RepairWork]: {
    readonly kind: Kind
    readonly model: SystemModel
    readonly options: RepairWork[Kind]['options']
  }
}[keyof RepairWork]

/** Searches; the model is one that resolves. */
export function doRepairWork(
  ask: RepairAsk,
  onSpent: (evaluations: number) => void,
): RepairWork[keyof RepairWork]['answer'] {
  const evaluation = evaluationOf(ask.model)
  switch (ask.kind) {
    case 'plan':
      return repairPlan(evaluation, { ...ask.options, onSpent })
    case 'nearest':
      return nearestPassing(evaluation, ask.options.token, { ...ask.options, onSpent })
    case 'mend':
      return mendFindings(evaluation, { ...ask.options, onSpent })
  }
}

function evaluationOf(model: SystemModel): Evaluation {
  const checked = checkSystem(model)
  if (!checked.ok) throw new TypeError('Only a system that resolves can be repaired')
  return checked.evaluation
}
