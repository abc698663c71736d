import { Command, CommanderError, InvalidArgumentError } from 'commander'

/** The flags as given; absent ones leave the word to the configuration file. */
export interface GateFlags {
  readonly url?: string
  readonly system?: string
  readonly against?: string
  readonly tokens?: readonly string[]
  readonly pairs?: string
  readonly newOnly?: boolean
  readonly format?: readonly string[]
  readonly config?: string
  readonly timeout?: number
}

export type CommandLine =
  | { readonly kind: 'gate'; readonly flags: GateFlags }
  | { readonly kind: 'help'; readonly text: string }
  | { readonly kind: 'refused'; readonly text: string }

const PURPOSE =
  'Checks the colours of a build against a design system and fails it on a breach. Sends one check to the service: your token files merged over the head, your pairs added to the declared ones. Without either it checks the head as it stands.'

const REST_OF_HELP = `
Configuration file
  dyewright.json in the working directory, or --config FILE. The same keys: url,
  system, against, tokens, pairs, newOnly, format; and source, an object of
  repository, branch, commit and pipelineUrl that is kept with the check. A flag
  beats the file; its file names start at its folder; unknown keys are refused.

Files
  A token file is a Design Tokens (2025.10) document. Several are merged in
  order; where two set one token the later wins, and the gate says so.
  A pairs file is an array of pairs:
  [{ "foreground": "text.muted", "background": "surface.deck", "use": "text" }]

Formats
  text   a table of breaches (the default)
  json   the check as the service answered it
  sarif  a SARIF 2.1.0 log: a rule for each WCAG criterion, fingerprints that
         outlive renames, tokens as logical locations
  Several at once are fine where all but one go to a file.

Environment
  DYEWRIGHT_KEY   the API key, scope checks:write; it is read from nowhere else
  DYEWRIGHT_SOURCE_REPOSITORY, DYEWRIGHT_SOURCE_BRANCH, DYEWRIGHT_SOURCE_COMMIT,
  DYEWRIGHT_SOURCE_PIPELINE_URL   where the build comes from; beat the file
  NO_COLOR        no colour, no swatches; FORCE_COLOR: both without a terminal

Exit codes
  0  pass
  1  breach
  2  usage or configuration: a flag, a file, or a request the service refused
  3  no verdict: unreachable, timed out, too many requests, the service failed
  4  refused: the key is missing, wrong, or lacks the right

Examples
  DYEWRIGHT_KEY=dyw_ci_… dyewright gate --url https://colors.example.com \\
    --system larkhaven --tokens tokens/core.json tokens/site.json
  dyewright gate --new-only --format text json=check.json sarif=check.sarif
`

const readSeconds = (text: string): number => {
  const seconds = Number(text)
  if (!/^\d+(\.\d+)?$/.test(text) || seconds <= 0 || seconds > 3600) {
    throw new InvalidArgumentError('Give seconds above 0, at most 3600.')
  }
  return seconds
}

const gateCommand = (): Command =>
  new Command('gate')
    .summary('fail the build that breaches a declared pair')
    .description(PURPOSE)
    .usage('[options]')
    .option('--url <url>', 'address of the service')
    .option('--system <key>', 'design system to check against')
    .option('--against <revision>', 'revision to merge over and compare with (default head)')
    .option('--tokens <file...>', 'candidate token files, later ones over earlier ones')
    .option('--pairs <file>', 'pairs to measure besides the declared ones')
    .option('--new-only', 'fail on new or worsened breaches only')
    .option('--format <format...>', 'text, json or sarif; NAME=FILE writes to a file')
    .option('--config <file>', 'configuration file')
    .option('--timeout <seconds>', 'limit of the run, retries included (default 60)', readSeconds)
    .allowExcessArguments(false)
    .addHelpText('after', REST_OF_HELP)

/** Reads the arguments after `node` and the script; nothing is printed and nothing ends the process. */
export function readCommandLine(argv: readonly string[]): CommandLine {
  let out = ''
  let err = ''
  let flags: GateFlags | undefined
  const output = {
    writeOut: (text: string) => {
      out += text
    },
    writeErr: (text: string) => {
      err += text
    },
    getOutHelpWidth: () => 80,
    getErrHelpWidth: () => 80,
    getOutHasColors: () => false,
    getErrHasColors: () => false,
  }
  const program = new Command('dyewright').description('Keeps a product family’s colours fast.')
  const gate = gateCommand().action((given: GateFlags) => {
    flags = given
  })
  for (const command of [program, gate]) command.exitOverride().configureOutput(output)
  program.addCommand(gate)
  try {
    program.parse([...argv], { from: 'user' })
  } catch (error) {
    if (!(error instanceof CommanderError)) throw error
    if (error.exitCode === 0) return { kind: 'help', text: out }
  }
  if (flags) return { kind: 'gate', flags }
  return { kind: 'refused', text: err || out }
}
