import { emptyPairTally, holdPairs } from '#tests/unit/checks/pair-agreement.ts'

// The engine against a naive verdict of its own arithmetic, pair by pair. Seeds count up, so that a difference
// can be met again: tsx scripts/agreement-pairs.ts [pairs] [first seed]
const A_SYSTEM = 50
const [wanted = 1_000_000, firstSeed = 1] = process.argv.slice(2).map(Number)
const tally = emptyPairTally()
let differing = 0

for (let system = 0; system < wanted / A_SYSTEM; system++) {
  try {
    holdPairs(firstSeed + system, A_SYSTEM, tally)
  } catch (error) {
    differing++
    console.log(`seed ${firstSeed + system}: ${error instanceof Error ? error.message : error}`)
  }
  if ((system + 1) % 2000 === 0) console.log(`${(system + 1) * A_SYSTEM} pairs`)
}

const { pairs, widest, ...kinds } = tally
console.log(
  `${pairs} pairs agree, ${differing} systems differ; widest difference of ratios ${widest}`,
)
for (const [kind, count] of Object.entries(kinds)) console.log(`  ${kind.padEnd(12)}${count}`)
process.exitCode = differing > 0 ? 1 : 0
