import type { ResolvedToken } from './resolved.ts'

/**
 * Resolved tokens by id over their rows in ledger order. Where an edit leaves the ledger as it was, the positions are
 * shared and only the rows are copied, which costs next to nothing.
 */
export class TokenRows implements ReadonlyMap<string, ResolvedToken> {
  constructor(
    private readonly positions: ReadonlyMap<string, number>,
    /** By position. */
    readonly rows: readonly ResolvedToken[],
  ) {}

  get size(): number {
    return this.rows.length
  }

  get(id: string): ResolvedToken | undefined {
    const position = this.positions.get(id)
    return position === undefined ? undefined : this.rows[position]
  }

  has(id: string): boolean {
    return this.positions.has(id)
  }

  *entries(): MapIterator<[string, ResolvedToken]> {
    for (const row of this.rows) yield [row.token.id, row]
  }

  *keys(): MapIterator<string> {
    for (const row of this.rows) yield row.token.id
  }

  values(): MapIterator<ResolvedToken> {
    return this.rows.values()
  }

  [Symbol.iterator](): MapIterator<[string, ResolvedToken]> {
    return this.entries()
  }

  forEach(
    visit: (token: ResolvedToken, id: string, map: ReadonlyMap<string, ResolvedToken>) => void,
  ): void {
    for (const row of this.rows) visit(row, row.token.id, this)
  }
}
