import { writeFile } from 'node:fs/promises'
import { fileURLToPath } from 'node:url'
import { createDocument, documentText } from './document.ts'

/** `npm run openapi`: writes the committed document, whose diff is the review of the API. */
await writeFile(
  fileURLToPath(new URL('./openapi.json', import.meta.url)),
  documentText(createDocument()),
)
