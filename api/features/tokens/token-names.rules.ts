import { refuse, refuseFaults, type SystemIndex } from '#shared/contracts/governed-system.ts'

/**
 * Why a token cannot have this name: another token has it (also where the two differ by Unicode
 * composition only), or one of the two would have to be a group and a token at once.
 */
export function nameRefusal({ model }: SystemIndex, name: string, id: string) {
  const normal = name.normalize('NFC')
  for (const token of model.tokens) {
    if (token.id === id) continue
    const other = token.name.normalize('NFC')
    if (other === normal) return refuse('token-name-taken', `There is a token ${token.name}`)
    if (other.startsWith(`${normal}.`))
      return childRefusal(`${name} is a group: ${token.name} is in it`)
    if (normal.startsWith(`${other}.`))
      return childRefusal(`${token.name} is a token, so it holds none`)
  }
  return undefined
}

const childRefusal = (detail: string) => refuseFaults([{ pointer: '/name', detail }])
