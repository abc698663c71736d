import { describe, expect, it } from 'vitest'
import { type Planned, planFrom } from '#scripts/gate/plan.ts'
import type { ReadText } from '#scripts/gate/settings.ts'

const disk =
  (files: Readonly<Record<string, string>>): ReadText =>
  (path) => {
    const text = files[path]
    return text === undefined ? { ok: false, reason: 'there is no such file' } : { ok: true, text }
  }

const plan = (argv: string, files: Record<string, string> = {}, env: Record<string, string> = {}) =>
  planFrom(['gate', ...argv.split(' ').filter(Boolean)], env, disk(files))

const planned = (outcome: Planned) => {
  if (outcome.kind !== 'plan') throw new Error(`no plan: ${JSON.stringify(outcome)}`)
  return outcome.plan
}
const faults = (outcome: Planned) => {
  if (outcome.kind !== 'refused') throw new Error(`not refused: ${outcome.kind}`)
  return outcome.faults.join('\n')
}
const WHERE = '--url http://127.0.0.1:4310 --system larkhaven'

describe('a plan from flags', () => {
  it('answers the least body: the head as it stands', () => {
    const { body, baseUrl, system, outputs, timeoutMs } = planned(plan(WHERE))
    expect(body).toEqual({})
    expect({ baseUrl, system }).toEqual({ baseUrl: 'http://127.0.0.1:4310', system: 'larkhaven' })
    expect(outputs).toEqual([{ format: 'text' }])
    expect(timeoutMs).toBe(60_000)
  })

  it('answers every option in the body', () => {
    const files = { 'a.json': '{"x":{"$value":"{y}"}}', 'p.json': '[{"foreground":"x"}]' }
    const options = '--against head --tokens a.json --pairs p.json --new-only --timeout 2.5'
    const { body, timeoutMs } = planned(plan(`${WHERE} ${options}`, files))
    expect(body).toEqual({
      against: 'head',
      tokens: { x: { $value: '{y}' } },
      pairs: [{ foreground: 'x' }],
      newOnly: true,
    })
    expect(timeoutMs).toBe(2500)
  })

  it('answers several formats, one to the output and one to a file', () => {
    const { outputs } = planned(plan(`${WHERE} --format text json=out/check=1.json sarif=a`))
    expect(outputs).toEqual([
      { format: 'text' },
      { format: 'json', file: 'out/check=1.json' },
      { format: 'sarif', file: 'a' },
    ])
  })

  it('answers the key of the environment and of nowhere else', () => {
    expect(planned(plan(WHERE)).key).toBeUndefined()
    expect(planned(plan(WHERE, {}, { DYEWRIGHT_KEY: ' dyw_ci_1\n' })).key).toBe('dyw_ci_1')
    expect(faults(plan(WHERE, { 'dyewright.json': '{"key":"dyw_ci_1"}' }))).toContain(
      'it is read from DYEWRIGHT_KEY',
    )
  })

  it('answers where the build comes from, the environment over the file', () => {
    const files = { 'dyewright.json': '{"source":{"repository":"a/b","branch":"main"}}' }
    const env = { DYEWRIGHT_SOURCE_BRANCH: 'fog', DYEWRIGHT_SOURCE_COMMIT: '4be1d02' }
    expect(planned(plan(WHERE, files, env)).body.source).toEqual({
      repository: 'a/b',
      branch: 'fog',
      commit: '4be1d02',
    })
  })
})

describe('a plan from a configuration file', () => {
  const configuration = JSON.stringify({
    url: 'https://colors.example.com/dyewright/',
    system: 'larkhaven',
    against: 'head',
    tokens: ['core.json'],
    pairs: 'pairs.json',
    newOnly: true,
    format: ['json=check.json', 'text'],
  })

  it('answers the same as flags, with paths from the folder of the file', () => {
    const files = {
      'ci/dyewright.json': configuration,
      'ci/core.json': '{}',
      'ci/pairs.json': '[]',
    }
    const { baseUrl, body, outputs } = planned(plan('--config ci/dyewright.json', files))
    expect(baseUrl).toBe('https://colors.example.com/dyewright')
    expect(body).toEqual({ against: 'head', tokens: {}, pairs: [], newOnly: true })
    expect(outputs).toEqual([{ format: 'json', file: 'ci/check.json' }, { format: 'text' }])
  })

  it('leaves the word to a flag, whose paths start at the working directory', () => {
    const files = {
      'dyewright.json': configuration,
      'other.json': '{"a":{}}',
      'pairs.json': '[]',
    }
    const { body, system, outputs } = planned(
      plan('--tokens other.json --system skerry --format json', files),
    )
    expect(body.tokens).toEqual({ a: {} })
    expect(system).toBe('skerry')
    expect(outputs).toEqual([{ format: 'json' }])
  })

  it.each([
    ['{"tokns":[]}', 'unknown key "tokns"'],
    ['{"newOnly":"yes"}', 'newOnly must be true or false'],
    ['{"tokens":[1]}', 'tokens must be a file name or a list of them'],
    ['{"source":{"tag":"x"}}', 'unknown key "source.tag"'],
    ['{"__proto__":{}}', 'unknown key "__proto__"'],
    ['[]', 'must hold one JSON object'],
    ['{', 'is not JSON'],
  ])('refuses %s', (text, reason) => {
    expect(faults(plan(WHERE, { 'dyewright.json': text }))).toContain(reason)
  })

  it('refuses a named file that is not there, and does without an unnamed one', () => {
    expect(faults(plan(`${WHERE} --config no.json`))).toContain('no.json cannot be read')
    expect(planned(plan(WHERE)).system).toBe('larkhaven')
  })
})

describe('usage', () => {
  it.each([
    ['', 'Give --url'],
    ['--url http://a', 'Give --system'],
    ['--url ftp://a --system x', 'is no address of a service'],
    ['--url http://user:pw@a --system x', 'is no address of a service'],
    [`${WHERE} --nope`, "unknown option '--nope'"],
    [`${WHERE} spare`, 'too many arguments'],
    [`${WHERE} --timeout 0`, 'Give seconds above 0'],
    [`${WHERE} --timeout soon`, 'Give seconds above 0'],
    [`${WHERE} --format xml`, 'There is no format "xml"'],
    [`${WHERE} --format json=`, 'json= names no file'],
    [`${WHERE} --format json text`, 'Two formats would go to one place'],
    [`${WHERE} --tokens no.json`, 'no.json cannot be read: there is no such file'],
  ])('refuses %s', (argv, reason) => {
    expect(faults(plan(argv))).toContain(reason)
  })

  it('refuses files of the wrong shape, all at once', () => {
    const files = { 'a.json': '[]', 'b.json': 'x', 'p.json': '{}' }
    const said = faults(plan(`${WHERE} --tokens a.json b.json --pairs p.json`, files))
    expect(said).toContain('a.json must hold one JSON object')
    expect(said).toContain('b.json is not JSON')
    expect(said).toContain('p.json must hold a JSON array of pairs')
  })

  it('refuses a key that no header can carry', () => {
    expect(faults(plan(WHERE, {}, { DYEWRIGHT_KEY: 'dyw\u0000x' }))).toContain('DYEWRIGHT_KEY')
  })

  it('answers help that names every option, key, variable and exit code, 80 columns wide', () => {
    const help = plan('--help')
    if (help.kind !== 'help') throw new Error(help.kind)
    for (const word of [
      ...['--url', '--system', '--against', '--tokens', '--pairs', '--new-only', '--format'],
      ...['--config', '--timeout', 'newOnly', 'dyewright.json', 'DYEWRIGHT_KEY', 'NO_COLOR'],
      ...['  0  pass', '  1  breach', '  2  usage', '  3  no verdict', '  4  refused'],
    ]) {
      expect(help.text).toContain(word)
    }
    expect(Math.max(...help.text.split('\n').map((line) => line.length))).toBeLessThanOrEqual(80)
  })

  it('refuses no command, an unknown one, and answers the help of the program', () => {
    expect(planFrom([], {}, disk({})).kind).toBe('refused')
    expect(planFrom(['weave'], {}, disk({})).kind).toBe('refused')
    expect(planFrom(['--help'], {}, disk({})).kind).toBe('help')
  })

  it('calls out a key that travels over plain http', () => {
    const env = { DYEWRIGHT_KEY: 'dyw_ci_1' }
    const far = planned(plan('--url http://colors.example.com --system x', {}, env))
    expect(far.notes).toEqual(['The key travels over plain http; use https'])
    expect(planned(plan(WHERE, {}, env)).notes).toEqual([])
  })
})
