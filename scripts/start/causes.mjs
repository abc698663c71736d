// @ts-check

/** What a failed program says → what the person at the terminal can do about it. */
const CAUSES = [
  {
    says: /ENOSPC|No space left on device|\b(error|errno:|error number) 28\b/,
    line: 'The disk is full. Packages and database take about 700 MB: make room, then run this again.',
  },
  {
    says: /Could not get lock|Unable to acquire the dpkg|Unable to lock/,
    line: 'Another package run holds the lock of dpkg: let it finish, then run this again.',
  },
  {
    says: /dpkg was interrupted/,
    line: 'An earlier package run broke off: run `sudo dpkg --configure -a`, then this again.',
  },
  {
    says: /npm error code (E[A-Z_]*AGAIN|ENOTFOUND|E[A-Z]+UNREACH|ECONN[A-Z]+|E[A-Z]*TIMEDOUT|ENOTCACHED)|Temporary failure resolving|Unable to fetch/,
    line: 'The network does not reach the packages. They are fetched once: connect, then run this again.',
  },
  {
    says: /EACCES|Permission denied/,
    line: 'A file here belongs to somebody else: give this folder to the user who runs this.',
  },
]

/**
 * @param {string} text what a program or the system said
 * @returns {string | undefined} one line that says what to do, where the cause is a known one
 */
export function causeOf(text) {
  return CAUSES.find(({ says }) => says.test(text))?.line
}
