import fc from 'fast-check'
import { expect, it } from 'vitest'
import { readImport } from '#api/features/imports/read-import.rules.ts'
import { decideImport, importedModel } from '#api/features/imports/imports.rules.ts'
import type { ItemIds } from '#api/features/imports/import-names.rules.ts'
import { presentResolverFile } from '#api/features/imports/resolver-file.presenter.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { GovernedSystem } from '#shared/checks/governed-model.ts'
import { colorOf, statesOf } from '#shared/checks/resolved.ts'
import { renderColor } from '#shared/color/render.ts'
import { indexSystem } from '#shared/contracts/governed-system.ts'
import type { JsonObject } from '#shared/formats/dtcg-fault.ts'
import { readDtcgResolver } from '#shared/formats/dtcg-resolver.ts'
import { type DtcgDocument, readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'
import { Dice } from '#tests/unit/checks/random-system.ts'
import { randomGoverned } from './random-governed.ts'

const EMPTY: GovernedSystem = {
  settings: { level: 'AA', p3: false, p3Gates: false },
  states: {},
  prefixes: [],
  themes: [],
  tokens: [],
  pairs: [],
}

/** The file of a system, or nothing where its colours cannot be told. */
function fileOf(model: GovernedSystem): string | undefined {
  const checked = checkSystem(model)
  if (!checked.ok) return undefined
  return presentResolverFile({ index: indexSystem(model), evaluation: checked.evaluation })
}

function imported(into: GovernedSystem, text: string, ids: ItemIds) {
  const file = readImport(JSON.parse(text) as JsonObject, { stands: () => false, legacyHex: false })
  if (!file.ok) throw new Error(JSON.stringify(file.faults, undefined, 1))
  const options = { mode: 'replace' as const, ids, span: {}, exempts: true }
  const decision = decideImport(indexSystem(into), file.file, options)
  if (!decision.ok) throw new Error(JSON.stringify(decision.refusal, undefined, 1))
  return { file: file.file, edits: decision.edits, model: importedModel(into, decision.edits) }
}

/** The ids that items of one system have, for what a file brings into another. */
function idsIn(model: GovernedSystem): ItemIds {
  const { names } = indexSystem(model)
  let pairs = 0
  return (kind, key) => {
    if (kind === 'tok') return names.tokenId(key)!
    if (kind === 'thm') return names.themeId(key)!
    if (kind === 'set') return `set_${key}`
    pairs += 1
    return `p${pairs - 1}`
  }
}

it('leaves a system as it is that takes its own file back', () => {
  let systems = 0
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      const model = randomGoverned(new Dice(seed))
      const text = fileOf(model)
      if (text === undefined) return
      const made = imported(EMPTY, text, idsIn(model))
      expect(made.file.notes).toEqual([])
      expect(made.model.tokens.map(({ name }) => name)).toEqual(
        model.tokens.map(({ name }) => name),
      )
      expect(JSON.parse(fileOf(made.model)!)).toEqual(JSON.parse(text))
      expect(JSON.parse(made.model.remainder ?? '{}')).toEqual(JSON.parse(model.remainder ?? '{}'))
      const again = imported(made.model, text, () => 'never')
      expect(again.edits).toEqual({
        tokens: { put: [], remove: [] },
        pairs: { put: [], remove: [] },
        distinctSets: { put: [], remove: [] },
      })
      systems += 1
    }),
    { numRuns: 50 },
  )
  expect(systems).toBeGreaterThan(12)
}, 60_000)

function bytesOf(document: DtcgDocument, name: string): string {
  const token = document.tokens.find((each) => each.name === name)
  if (token === undefined) throw new Error(`There is no ${name}`)
  if (token.value.kind === 'alias') return bytesOf(document, token.value.name)
  return JSON.stringify(renderColor(token.value.color))
}

it('answers the bytes of the engine in each theme and state, read by the rules of resolvers alone', () => {
  let colors = 0
  fc.assert(
    fc.property(fc.integer(), (seed) => {
      const model = randomGoverned(new Dice(seed), 6)
      const checked = checkSystem(model)
      const text = fileOf(model)
      if (!checked.ok || text === undefined) return
      const { resolved } = checked.evaluation
      const reading = readDtcgResolver(JSON.parse(text))
      if (!reading.ok) throw new Error(JSON.stringify(reading.faults))
      const modifiers = reading.resolver.modifiers.map(({ name }) => name)
      for (const { input, document } of reading.resolver.permutations()) {
        const read = readDtcgTokens(document)
        expect(read.faults).toEqual([])
        const theme = model.themes.find(({ key }) => key === (input.theme ?? 'light'))!.id
        const state = modifiers.includes('state') ? input.state! : 'rest'
        for (const { id, name } of model.tokens) {
          const own = statesOf(resolved, id).find((each) => each === state) ?? 'rest'
          const wanted = renderColor(colorOf(resolved, { token: id, theme, state: own }).oklch)
          expect({ name, input, bytes: bytesOf(read, name) }).toEqual({
            name,
            input,
            bytes: JSON.stringify(wanted),
          })
          colors += 1
        }
      }
    }),
    { numRuns: 40 },
  )
  expect(colors).toBeGreaterThan(1000)
}, 60_000)
