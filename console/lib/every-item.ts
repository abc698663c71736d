import type { Answer } from '#shared/client/client.ts'

/** All items of a list, page after page. */
export async function everyItem<Item>(
  readPage: (cursor: string | undefined) => Promise<Answer<{ items: readonly Item[] }>>,
): Promise<Item[]> {
  const items: Item[] = []
  let cursor: string | undefined
  do {
    const page = await readPage(cursor)
    items.push(...page.body.items)
    cursor = page.next
  } while (cursor !== undefined)
  return items
}
