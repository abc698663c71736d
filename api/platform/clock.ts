/** What the process takes for the time. Deadlines that others rely on go by the database's clock instead. */
export interface Clock {
  now(): Date
}

export const systemClock: Clock = { now: () => new Date() }
