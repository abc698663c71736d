import { deltaE2000, type LabD65, labOfBytes } from '#shared/color/difference.ts'
import {
  type Deficiency,
  DEFICIENCIES,
  simulateBytes,
  simulationMatrix,
  type SrgbBytes,
} from '#shared/color/simulate.ts'
import { createPixel, paintLayer } from './layers.ts'
import type { DistinctSet } from './model.ts'
import { type ResolvedCell, type ResolvedSystem, STATE_COUNT } from './resolved.ts'

/** How members are seen: as they are, or under a deficiency. */
export const DISTINCT_VIEWS = ['plain', ...DEFICIENCIES] as const
/** One of the views. */
export type DistinctView = (typeof DISTINCT_VIEWS)[number]

/** What the deficiencies are simulated with, so that every result can name it. */
export const DISTINCT_SIMULATION = { model: 'machado-2009', severity: 1 } as const

/** A member of a distinct set as it is seen: opaque bytes. */
export interface DistinctMember {
  readonly name: string
  readonly color: SrgbBytes
}

/** The two members hardest to tell apart. */
export interface ClosestCouple {
  readonly first: string
  readonly second: string
  /** CIEDE2000, unrounded; 0 where both are one colour. */
  readonly deltaE2000: number
}

/** The closest couple in each view. */
export type DistinctMeasure = { readonly [view in DistinctView]: ClosestCouple }

const MATRICES: { readonly [deficiency in Deficiency]: ReturnType<typeof simulationMatrix> } = {
  protan: simulationMatrix({ ...DISTINCT_SIMULATION, deficiency: 'protan' }),
  deutan: simulationMatrix({ ...DISTINCT_SIMULATION, deficiency: 'deutan' }),
  tritan: simulationMatrix({ ...DISTINCT_SIMULATION, deficiency: 'tritan' }),
}

function labIn(view: DistinctView, color: SrgbBytes): LabD65 {
  const { r, g, b } = view === 'plain' ? color : simulateBytes(color, MATRICES[view])
  return labOfBytes(r, g, b)
}

function closestCouple(members: readonly DistinctMember[], view: DistinctView): ClosestCouple {
  const labs = members.map(({ color }) => labIn(view, color))
  let closest: ClosestCouple | undefined
  for (const [at, first] of members.entries()) {
    for (let other = at + 1; other < members.length; other++) {
      const distance = deltaE2000(labs[at]!, labs[other]!)
      if (closest !== undefined && distance >= closest.deltaE2000) continue
      closest = { first: first.name, second: members[other]!.name, deltaE2000: distance }
    }
  }
  return closest!
}

/**
 * Measures how well members can be told apart: the smallest CIEDE2000 between any two of them, as they are and under
 * each simulated deficiency. Of equal couples the first in order is named.
 * @param members two or more, in the order of the set
 * @throws {TypeError} for fewer
 * @see https://doi.org/10.1002/col.20070 CIEDE2000
 */
export function measureDistinctSet(members: readonly DistinctMember[]): DistinctMeasure {
  if (members.length < 2) throw new TypeError('a distinct set has two members or more')
  return {
    plain: closestCouple(members, 'plain'),
    protan: closestCouple(members, 'protan'),
    deutan: closestCouple(members, 'deutan'),
    tritan: closestCouple(members, 'tritan'),
  }
}

/** A distinct set measured in one theme; couples are token ids. */
export interface MeasuredDistinctSet {
  readonly set: DistinctSet
  /** Theme id. */
  readonly theme: string
  readonly couples: DistinctMeasure
}

/** A set in one theme, and where its colours are read. */
export interface SetInTheme {
  readonly set: DistinctSet
  /** Theme position. */
  readonly theme: number
  /** The theme's ground, by token id. */
  readonly ground: string
  readonly cellsOf: (token: string) => readonly ResolvedCell[]
}

/** Measures a set in one theme: its tokens at rest, composited on the theme's ground. */
export function measureSetInTheme({ set, theme, ground, cellsOf }: SetInTheme): DistinctMeasure {
  const renderedOf = (id: string) => cellsOf(id)[theme * STATE_COUNT]!.color.rendered
  return measureDistinctSet(
    set.tokens.map((id) => {
      const color = createPixel()
      paintLayer(color, renderedOf(ground), 'srgb')
      paintLayer(color, renderedOf(id), 'srgb')
      return { name: id, color }
    }),
  )
}

/** Measures every distinct set in every theme. Reported beside a verdict, never part of it. */
export function measureDistinctSets(resolved: ResolvedSystem): MeasuredDistinctSet[] {
  const { distinctSets = [], themes } = resolved.model
  const cellsOf = (id: string) => resolved.tokens.get(id)!.cells
  return distinctSets.flatMap((set) =>
    themes.map(({ id, ground }, theme) => ({
      set,
      theme: id,
      couples: measureSetInTheme({ set, theme, ground, cellsOf }),
    })),
  )
}
