import { readFileSync, writeFileSync } from 'node:fs'
import type { CheckWire } from '#shared/contracts/checks.contract.ts'
import { requestCheck } from './check-call.ts'
import { EXIT, type ExitCode } from './exit-codes.ts'
import { hasColor } from './paint.ts'
import { type Format, type Plan, planFrom } from './plan.ts'
import { reasonOf, refusalOf } from './refusal.ts'
import { jsonOf, reportOf, sarifTextOf } from './report.ts'
import type { ReadText } from './settings.ts'
import { plain } from './terminal-text.ts'

const say = (lines: readonly string[]): void => {
  if (lines.length > 0) process.stderr.write(`${lines.join('\n')}\n`)
}

const readDisk: ReadText = (path) => {
  try {
    return { ok: true, text: readFileSync(path, 'utf8') }
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException
    return { ok: false, reason: code === 'ENOENT' ? 'there is no such file' : message }
  }
}

const surfaceOf = (isFile: boolean) => ({
  hasColor: !isFile && hasColor(process.env, process.stdout.isTTY === true),
  columns: isFile ? 80 : Math.min(120, Math.max(60, process.stdout.columns ?? 80)),
})

type Written = (check: CheckWire, system: string, isFile: boolean) => string

const textIn: Readonly<Record<Format, Written>> = {
  text: (check, system, isFile) => reportOf(check, system, surfaceOf(isFile)),
  json: jsonOf,
  sarif: sarifTextOf,
}

const writeOutputs = (check: CheckWire, { outputs, system }: Plan): string[] =>
  outputs.flatMap(({ format, file }) => {
    const isFile = file !== undefined
    const text = textIn[format](check, system, isFile)
    if (!isFile) {
      process.stdout.write(text)
      return []
    }
    try {
      writeFileSync(file, text)
      return []
    } catch (error) {
      return [`${file} cannot be written: ${(error as Error).message}`]
    }
  })

const runPlan = async (plan: Plan): Promise<ExitCode> => {
  say(plan.notes.map(plain))
  let check: CheckWire
  try {
    check = await requestCheck(plan, (failure, delayMs) => {
      say([`Trying again in ${delayMs / 1000} s: ${reasonOf(failure)}`])
    })
  } catch (failure) {
    const { exitCode, lines } = refusalOf(failure, plan)
    say(lines)
    return exitCode
  }
  const faults = writeOutputs(check, plan)
  say(faults)
  if (faults.length > 0) return EXIT.usage
  return check.verdict === 'pass' ? EXIT.pass : EXIT.breach
}

const run = async (): Promise<ExitCode> => {
  const planned = planFrom(process.argv.slice(2), process.env, readDisk)
  if (planned.kind === 'plan') return runPlan(planned.plan)
  if (planned.kind === 'help') {
    process.stdout.write(planned.text)
    return EXIT.pass
  }
  say([...planned.faults.map(plain), 'See dyewright gate --help.'])
  return EXIT.usage
}

// Node ends with 1 on an error that nobody caught, which here would say `breach`.
process.on('uncaughtException', (error) => {
  say([`The gate itself failed, so there is no verdict: ${plain(error.message)}`])
  process.exit(EXIT.noVerdict)
})
// A reader that closes early (`| head`) takes nothing from the verdict.
process.stdout.on('error', () => undefined)
process.exitCode = EXIT.noVerdict

run().then(
  (exitCode) => {
    process.exitCode = exitCode
  },
  (error: unknown) => {
    say([`The gate itself failed, so there is no verdict: ${plain(String(error))}`])
  },
)
