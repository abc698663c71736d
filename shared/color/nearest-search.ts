import type { Oklch } from './oklch.ts'
import { POWERLESS_CHROMA } from './gamut-map.ts'
import { maxChroma } from './max-chroma.ts'
import type { Gamut } from './rgb-gamut.ts'

/** What trying one colour says. */
export interface ColorTrial {
  /** What is to be least, in ΔE OK. */
  readonly cost: number
  /** Decides between equal costs. */
  readonly sum: number
  /** How far it is from passing, as the natural logarithm of required over measured; 0 or less passes. */
  readonly short: number
  /** Present and true where it falls short by no ratio but is not wanted all the same. */
  readonly isBarred?: true
}

/** A search for the nearest colour that passes. */
export interface NearestSearch {
  readonly start: Oklch
  /** The widest gamut that ships. */
  readonly gamut: Gamut
  readonly trial: (color: Oklch) => ColorTrial
  /** Colours tried, at most. */
  readonly budget: number
}

/** What a search found. */
export interface NearestResult {
  readonly found?: { readonly color: Oklch; readonly cost: number }
  /** Colours tried. */
  readonly evaluations: number
  /** Whether the search stopped early: what it found may not be the nearest. */
  readonly isStopped: boolean
}

/** A box in lightness and chroma, by its middle. */
interface Box {
  readonly l: number
  readonly c: number
  readonly halfL: number
  readonly halfC: number
}

/** Width of the coarsest boxes, in lightness and chroma. */
const COARSE = 0.02
/** Boxes are halved this often: to 0.0006. */
const HALVINGS = 5
/** The logarithm of a ratio changes by less than this over a distance of 1 in OKLCH, derived values included. */
const STEEPEST = 14
/** The cost changes by less than this over a distance of 1, derived values included. */
const COSTLIEST = 3
/** Half a byte in OKLCH lightness, by the lightness from which on it is so little. */
const HALF_BYTES = [
  [0.25, 0.002],
  [0.15, 0.004],
  [0.07, 0.012],
  [0, 0.034],
] as const
/** The last steps round the best colour. */
const FINE_STEPS = [0.0012, 0.0006, 0.0003]

/** The least a colour of a box can cost, as far as its middle tells. */
function leastCost(box: Box, cost: number): number {
  const lowest = Math.max(0, box.l - box.halfL)
  const halfByte = HALF_BYTES.find(([from]) => lowest >= from)![1]
  return cost - COSTLIEST * reachOf(box) - halfByte
}

function reachOf(box: Box): number {
  return Math.hypot(box.halfL, box.halfC)
}

function coarseBoxes({ start, gamut }: NearestSearch): Box[] {
  const count = Math.round(1 / COARSE)
  const half = COARSE / 2
  const lightness = Array.from({ length: count }, (_, at) => (at + 0.5) * COARSE)
  const chroma = start.c ?? 0
  if (chroma <= POWERLESS_CHROMA) {
    return lightness.map((l) => ({ l, c: chroma, halfL: half, halfC: 0 }))
  }
  const hue = start.h ?? 0
  const widest = Math.max(...lightness.map((l) => maxChroma(l, hue, gamut)))
  const rows = Math.ceil((Math.max(widest, Math.min(chroma, 0.5)) + COARSE) / COARSE)
  return lightness.flatMap((l) =>
    Array.from({ length: rows }, (_, at) => ({
      l,
      c: (at + 0.5) * COARSE,
      halfL: half,
      halfC: half,
    })),
  )
}

function quarters({ l, c, halfL, halfC }: Box): Box[] {
  const quarter = { halfL: halfL / 2, halfC: halfC / 2 }
  const rows = halfC === 0 ? [0] : [-1, 1]
  return [-1, 1].flatMap((across) =>
    rows.map((down) => ({ l: l + (across * halfL) / 2, c: c + (down * halfC) / 2, ...quarter })),
  )
}

function isPassing({ short, isBarred }: ColorTrial): boolean {
  return short <= 0 && isBarred !== true
}

/** The search while it runs. */
class NearestRun {
  evaluations = 0
  best: { readonly color: Oklch; readonly trial: ColorTrial } | undefined
  readonly #search: NearestSearch
  constructor(search: NearestSearch) {
    this.#search = search
  }
  get isSpent(): boolean {
    return this.evaluations >= this.#search.budget
  }
  colorAt(l: number, c: number): Oklch {
    const { start } = this.#search
    return { l, c: start.c === null && c === 0 ? null : c, h: start.h, alpha: start.alpha }
  }
  try(color: Oklch): ColorTrial {
    this.evaluations++
    const trial = this.#search.trial(color)
    if (isPassing(trial) && this.isBetter(trial)) this.best = { color, trial }
    return trial
  }
  isBetter(trial: ColorTrial): boolean {
    if (this.best === undefined) return true
    const { cost, sum } = this.best.trial
    return trial.cost < cost || (trial.cost === cost && trial.sum < sum)
  }
}

/** Boxes whose middle was tried and in which something nearer may pass, the most promising first. */
function triedBoxes(run: NearestRun, boxes: readonly Box[]): { box: Box; least: number }[] {
  const open: { box: Box; least: number }[] = []
  for (const box of boxes) {
    if (run.isSpent) break
    const { cost, short } = run.try(run.colorAt(box.l, box.c))
    if (short > STEEPEST * reachOf(box)) continue
    open.push({ box, least: leastCost(box, cost) })
  }
  return open.sort((a, b) => a.least - b.least)
}

/** Draws the best colour towards the start as far as it still passes, then looks closely around. */
function drawNearer(run: NearestRun, start: Oklch): void {
  const from = run.best!.color
  let passing = 1
  let failing = 0
  for (let halving = 0; halving < 10 && !run.isSpent; halving++) {
    const part = (passing + failing) / 2
    const along = (a: number | null, b: number | null) => (a ?? 0) + part * ((b ?? 0) - (a ?? 0))
    const trial = run.try(run.colorAt(along(start.l, from.l), along(start.c, from.c)))
    if (isPassing(trial)) passing = part
    else failing = part
  }
  const isGrey = (start.c ?? 0) <= POWERLESS_CHROMA
  for (const step of FINE_STEPS) {
    const { l, c } = run.best!.color
    for (const across of [-1, 0, 1]) {
      for (const down of isGrey ? [0] : [-1, 0, 1]) {
        const lightness = l! + across * step
        if (run.isSpent || lightness < 0 || lightness > 1) continue
        run.try(run.colorAt(lightness, Math.max(0, (c ?? 0) + down * step)))
      }
    }
  }
}

/**
 * Finds the colour of the start's hue and alpha that passes at the least cost: boxes of lightness and chroma are
 * tried by their middles, and halved where something nearer may pass.
 */
export function searchNearest(search: NearestSearch): NearestResult {
  const run = new NearestRun(search)
  const { start } = search
  const first = run.try(start)
  const isDone = isPassing(first) && first.cost === 0
  let open = isDone ? [] : triedBoxes(run, coarseBoxes(search))
  for (let halving = 0; halving < HALVINGS && !run.isSpent && open.length > 0; halving++) {
    const next: typeof open = []
    for (const { box, least } of open) {
      if (run.isSpent || (run.best !== undefined && least >= run.best.trial.cost)) continue
      next.push(...triedBoxes(run, quarters(box)))
    }
    open = next.sort((a, b) => a.least - b.least)
  }
  if (!isDone && run.best !== undefined) drawNearer(run, start)
  const { best, evaluations } = run
  return {
    ...(best ? { found: { color: best.color, cost: best.trial.cost } } : {}),
    evaluations,
    isStopped: run.isSpent,
  }
}
