import { AsyncLocalStorage } from 'node:async_hooks'
import type { Executor, RunTransaction } from './database.ts'

interface Enclosing {
  readonly tx: Executor
  readonly afterCommit: (() => void)[]
  isOver: boolean
}

const enclosing = new AsyncLocalStorage<Enclosing | undefined>()

/** What outlives the transaction it was begun in is no part of it: the connection serves others by then. */
const openOne = (): Enclosing | undefined => {
  const outer = enclosing.getStore()
  return outer?.isOver === false ? outer : undefined
}

/**
 * Runs work inside one transaction that encloses every transaction and every read begun within it, so that
 * all of it is committed or none. Work that is given up as a deadlock's victim runs again as a whole.
 * @returns what the work answered, once it is committed; rejects with what it threw
 */
export async function enclose<T>(
  run: RunTransaction,
  work: (tx: Executor) => Promise<T>,
): Promise<T> {
  let hooks: (() => void)[] = []
  const result = await run(async (tx) => {
    hooks = []
    const outer: Enclosing = { tx, afterCommit: hooks, isOver: false }
    try {
      return await enclosing.run(outer, () => work(tx))
    } finally {
      outer.isOver = true
    }
  })
  for (const hook of hooks) hook()
  return result
}

/** The same runner, but within an enclosing transaction its work becomes part of that one. */
export const joinEnclosing =
  (run: RunTransaction): RunTransaction =>
  (work) => {
    const outer = openOne()
    return outer === undefined ? run(work) : work(outer.tx)
  }

/** The same database, but within an enclosing transaction statements run on its connection: none waits for another. */
export const followEnclosing = (db: Executor): Executor =>
  new Proxy(db, {
    get: (own, name) => {
      const executor = openOne()?.tx ?? own
      const member: unknown = Reflect.get(executor, name)
      return typeof member === 'function' ? member.bind(executor) : member
    },
  })

/** Runs work outside whatever encloses it: what it writes shows at once, and stays where the rest is given up. */
export const outsideEnclosing = <T>(work: () => Promise<T>): Promise<T> =>
  enclosing.run(undefined, work)

/** Runs the hook when what was written is committed: at once where nothing encloses it, never where it is given up. */
export function afterCommit(hook: () => void): void {
  const outer = openOne()
  if (outer === undefined) hook()
  else outer.afterCommit.push(hook)
}
