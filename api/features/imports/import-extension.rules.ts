import * as z from 'zod'
import { faultsOf } from '#shared/contracts/faults.ts'
import { idSchema, levelSchema, slugSchema, tokenNameSchema } from '#shared/contracts/fields.ts'
import { pairInputSchema } from '#shared/contracts/pairs.contract.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { rulesSchema, themeRuleSchema } from '#shared/contracts/rules.contract.ts'
import { type JsonObject, objectOf } from '#shared/formats/dtcg-fault.ts'
import { EXTENSION } from '#shared/formats/system-resolver.ts'
import type { ImportFile } from './import-file.ts'

const themeSchema = z.looseObject({
  id: idSchema.optional(),
  key: slugSchema,
  name: z.string().trim().min(1).max(120).optional(),
  from: slugSchema.optional(),
  ground: tokenNameSchema,
  ink: tokenNameSchema,
  rule: themeRuleSchema.optional(),
  level: levelSchema.optional(),
  gating: z.boolean().optional(),
})

const distinctSetSchema = z.looseObject({
  id: idSchema.optional(),
  name: z.string().trim().min(1).max(120),
  tokens: z.array(tokenNameSchema).min(2).max(200),
})

const settingsSchema = z.strictObject({
  level: levelSchema,
  p3: z.boolean(),
  p3Gates: z.boolean(),
  disabledFloor: z.number().min(1).max(21).nullable(),
})

/** What a file may say of the whole system beyond the format. */
const rootSchema = z.looseObject({
  engine: z.unknown().optional(),
  ledger: z.array(z.string()).optional(),
  themes: z.array(themeSchema).max(8).optional(),
  pairs: z
    .array(pairInputSchema.extend({ id: idSchema.optional() }))
    .max(20_000)
    .optional(),
  rules: rulesSchema.omit({ etag: true }).optional(),
  settings: settingsSchema.optional(),
  distinctSets: z.array(distinctSetSchema).max(200).optional(),
})

export type RootSaid = Pick<
  ImportFile,
  'ledger' | 'themes' | 'pairs' | 'rules' | 'settings' | 'distinctSets' | 'isWhole'
>

export type ExtensionReading =
  | { readonly ok: true; readonly said: RootSaid }
  | { readonly ok: false; readonly faults: readonly Fault[] }

const AT = `/$extensions/${EXTENSION}`

/** Reads what our own extension at the root of a file says of the system. A file that names its engine is whole. */
export function readRootExtension(file: JsonObject): ExtensionReading {
  const own = objectOf(file.$extensions)?.[EXTENSION] ?? {}
  const read = rootSchema.safeParse(own)
  if (read.error) {
    const faults = faultsOf(read.error, own).map((fault) => ({
      ...fault,
      pointer: `${AT}${fault.pointer}`,
    }))
    return { ok: false, faults }
  }
  const { engine, ledger, themes, pairs, rules, settings, distinctSets } = read.data
  return {
    ok: true,
    said: {
      isWhole: engine !== undefined,
      ...(ledger ? { ledger } : {}),
      ...(rules ? { rules } : {}),
      ...(themes
        ? { themes: themes.map((theme, at) => ({ ...theme, ...under('themes', at) })) }
        : {}),
      ...(pairs
        ? {
            pairs: pairs.map(({ id, ...pair }, at) => ({
              pair,
              ...(id === undefined ? {} : { id }),
              ...under('pairs', at),
            })),
          }
        : {}),
      ...(settings ? { settings: settingsIn(settings) } : {}),
      ...(distinctSets
        ? {
            distinctSets: distinctSets.map((set, at) => ({ ...set, ...under('distinctSets', at) })),
          }
        : {}),
    } as RootSaid,
  }
}

const under = (list: string, at: number) => ({ pointer: `${AT}/${list}/${at}` })

const settingsIn = ({ disabledFloor, ...settings }: z.output<typeof settingsSchema>) =>
  disabledFloor === null ? settings : { ...settings, disabledFloor }
