import { parentPort } from 'node:worker_threads'
import { doRepairWork, type RepairAsk } from './features/repair/repair-work.rules.ts'

const port = parentPort
if (port === null) throw new TypeError('This runs in a worker thread')

port.on('message', (ask: RepairAsk) => {
  const onSpent = (spent: number) => port.postMessage({ spent })
  try {
    port.postMessage({ answer: doRepairWork(ask, onSpent) })
  } catch (error) {
    port.postMessage({ error })
  }
})
