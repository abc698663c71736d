import { readFileSync } from 'node:fs'
import { expect, it } from 'vitest'
import { createDocument, documentText } from '#openapi/document.ts'

it('answers the committed document: after a change of contracts run npm run openapi', () => {
  const committed = readFileSync(new URL('../../../openapi/openapi.json', import.meta.url), 'utf8')
  expect(committed === documentText(createDocument())).toBe(true)
})
