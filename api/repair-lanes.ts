import { AsyncResource } from 'node:async_hooks'
import { Worker } from 'node:worker_threads'
import type { RepairAsk, RepairWork } from './features/repair/repair-work.rules.ts'

type Message =
  | { readonly spent: number }
  | { readonly answer: RepairWork[keyof RepairWork]['answer'] }
  | { readonly error: Error }

/** Searches one after the other, in a thread of their own: whoever waits, the process answers on. */
export interface RepairLane {
  run<Kind extends keyof RepairWork>(
    ask: Extract<RepairAsk, { kind: Kind }>,
    onSpent?: (evaluations: number) => void,
  ): Promise<RepairWork[Kind]['answer']>
  close(): Promise<void>
}

/** What somebody waits for does not wait for what nobody waits for. */
export interface RepairLanes {
  readonly prompt: RepairLane
  readonly patient: RepairLane
  close(): Promise<void>
}

export function createRepairLanes(): RepairLanes {
  const [prompt, patient] = [createRepairLane(), createRepairLane()]
  return {
    prompt,
    patient,
    close: async () => {
      await Promise.all([prompt.close(), patient.close()])
    },
  }
}

const IDLE_MS = 60_000

function createRepairLane(): RepairLane {
  let worker: Worker | undefined
  let turn: Promise<unknown> = Promise.resolve()
  let idle: NodeJS.Timeout | undefined
  const end = async () => {
    clearTimeout(idle)
    const ended = worker
    worker = undefined
    await ended?.terminate()
  }
  const readyWorker = () => {
    clearTimeout(idle)
    if (worker !== undefined) return worker
    const started = startWorker()
    // One that dies in its sleep is not asked again.
    started.on('error', () => undefined)
    started.on('exit', () => {
      if (worker === started) worker = undefined
    })
    worker = started
    return started
  }
  const search: RepairLane['run'] = async (ask, onSpent = () => {}) => {
    try {
      return await answerOf(readyWorker(), ask, AsyncResource.bind(onSpent))
    } finally {
      idle = setTimeout(() => void end(), IDLE_MS).unref()
    }
  }
  return {
    run: (ask, onSpent) => {
      const result = turn.then(() => search(ask, onSpent))
      turn = result.catch(() => undefined)
      return result
    },
    close: end,
  }
}

/** Read as TypeScript where the service runs from its sources, as it does under a test. */
const FROM_SOURCE = `import('tsx/esm/api').then(({ register }) => {
  register()
  return import(require('node:worker_threads').workerData)
})`

/** Built it lies beside the service. */
function startWorker(): Worker {
  const isSource = import.meta.url.endsWith('.ts')
  const file = new URL(isSource ? './repair-worker.ts' : './repair-worker.js', import.meta.url)
  const worker = isSource
    ? new Worker(FROM_SOURCE, { eval: true, workerData: file.href })
    : new Worker(file)
  worker.unref()
  return worker
}

function answerOf<Kind extends keyof RepairWork>(
  worker: Worker,
  ask: Extract<RepairAsk, { kind: Kind }>,
  onSpent: (evaluations: number) => void,
): Promise<RepairWork[Kind]['answer']> {
  return new Promise((resolve, reject) => {
    const settle = (by: () => void) => {
      worker.off('message', onMessage).off('error', onError).off('exit', onExit)
      by()
    }
    const onMessage = (message: Message) => {
      if ('spent' in message) onSpent(message.spent)
      else if ('error' in message) settle(() => reject(message.error))
      else settle(() => resolve(message.answer))
    }
    const onError = (error: Error) => settle(() => reject(error))
    const onExit = () => settle(() => reject(new Error('The search broke off')))
    worker.on('message', onMessage).on('error', onError).on('exit', onExit)
    worker.postMessage(ask)
  })
}
