/** What the gate's end says to a pipeline. Anything but `pass` stops a build. */
export const EXIT = {
  pass: 0,
  breach: 1,
  /** A flag, a configuration file, a candidate file, or a request that the service read and refused. */
  usage: 2,
  /** Unreachable, timed out, or failed: nothing is known, so the build does not go on. */
  noVerdict: 3,
  /** The key is missing, wrong, or lacks the right. */
  refused: 4,
} as const

export type ExitCode = (typeof EXIT)[keyof typeof EXIT]
