import { emptyTally, holdSequence } from '#tests/unit/checks/recheck-agreement.ts'

// Random systems and sequences of edits, each re-check held against a full check. Seeds count up, so that a
// difference can be met again: tsx scripts/soak-recheck.ts [sequences] [first seed]
const STEPS = 8
const [wanted = 10_000, firstSeed = 1] = process.argv.slice(2).map(Number)
const tally = emptyTally()
let differing = 0

for (let seed = firstSeed; tally.sequences < wanted; seed++) {
  try {
    holdSequence(seed, STEPS, tally)
  } catch (error) {
    differing++
    console.log(`seed ${seed}: ${error instanceof Error ? error.message : String(error)}`)
  }
  if (seed % 1000 === 0) console.log(`seed ${seed}: ${tally.sequences} sequences`)
}

const share = (part: number, all: number) =>
  `${part} of ${all} (${((100 * part) / all).toFixed(1)} %)`
console.log(`${tally.sequences} sequences of ${STEPS} edits, ${differing} differing`)
console.log(
  `${tally.edits} edits, ${tally.faulty} refused alike, ${tally.shared} with shared measures`,
)
console.log(`within reach of ${tally.counted} edits of tokens and pairs:`)
console.log(`  tokens computed ${share(tally.tokensComputed, tally.tokens)}`)
console.log(`  pairs measured  ${share(tally.pairsMeasured, tally.pairs)}`)
process.exitCode = differing > 0 ? 1 : 0
