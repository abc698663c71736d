import type * as z from 'zod'
import type { createDistinctSetBody } from '#shared/contracts/distinct-sets.contract.ts'
import type { pairInputSchema, patchPairBody } from '#shared/contracts/pairs.contract.ts'
import type { putRulesBody } from '#shared/contracts/rules.contract.ts'
import type { putThemeBody } from '#shared/contracts/themes.contract.ts'
import type { createTokenBody, patchTokenBody } from '#shared/contracts/tokens.contract.ts'

export type DemoToken = z.input<typeof createTokenBody>
export type DemoPair = z.input<typeof pairInputSchema>
export type DemoTheme = { readonly key: string } & z.input<typeof putThemeBody>
export type DemoRules = z.input<typeof putRulesBody>

/** Who does it: the part of their e-mail address before the sign. */
export type Person = 'admin' | 'maintainer' | 'pelle' | 'sanna' | 'a11y'

/** A pair is found again by what it declares. */
export type PairName = Pick<DemoPair, 'foreground' | 'background' | 'use' | 'product'>

type Doing =
  | { readonly kind: 'create-token'; readonly body: DemoToken }
  | {
      readonly kind: 'patch-token'
      readonly name: string
      readonly body: z.input<typeof patchTokenBody>
    }
  | { readonly kind: 'put-theme'; readonly theme: DemoTheme }
  | { readonly kind: 'put-rules'; readonly body: DemoRules }
  | {
      readonly kind: 'create-distinct-set'
      readonly body: z.input<typeof createDistinctSetBody>
    }
  | { readonly kind: 'create-pair'; readonly body: DemoPair & { readonly message: string } }
  | {
      readonly kind: 'patch-pair'
      readonly pair: PairName
      readonly body: z.input<typeof patchPairBody>
    }

/** One revision of the demo: who did what. */
export type Step = { readonly by: Person } & Doing
