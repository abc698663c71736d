import type { DemoToken } from './step.ts'

/** Lightness, chroma, hue of each step, light to dark. */
type Ramp = readonly (readonly [lightness: number, chroma: number, hue: number])[]

const SEA: Ramp = [
  [0.972, 0.012, 232],
  [0.925, 0.03, 233],
  [0.868, 0.055, 235],
  [0.79, 0.085, 238],
  [0.705, 0.11, 241],
  [0.62, 0.125, 243],
  [0.514, 0.115, 246],
  [0.43, 0.105, 248],
  [0.355, 0.085, 250],
  [0.285, 0.062, 252],
  [0.225, 0.042, 255],
]
const SAND: Ramp = [
  [0.979, 0.006, 95],
  [0.946, 0.011, 85],
  [0.905, 0.022, 88],
  [0.84, 0.034, 86],
  [0.74, 0.045, 82],
  [0.62, 0.048, 78],
  [0.48, 0.042, 74],
  [0.34, 0.03, 70],
]
const FOG: Ramp = [
  [0.965, 0.004, 240],
  [0.925, 0.008, 240],
  [0.87, 0.012, 240],
  [0.79, 0.016, 240],
  [0.7, 0.02, 240],
  [0.61, 0.023, 240],
  [0.53, 0.025, 241],
  [0.445, 0.026, 242],
  [0.36, 0.028, 244],
  [0.27, 0.03, 248],
]
const KELP: Ramp = [
  [0.955, 0.026, 158],
  [0.89, 0.06, 157],
  [0.8, 0.1, 155],
  [0.7, 0.122, 154],
  [0.595, 0.126, 153],
  [0.48, 0.108, 153],
  [0.37, 0.078, 155],
]
const BUOY: Ramp = [
  [0.957, 0.017, 20],
  [0.9, 0.045, 21],
  [0.81, 0.09, 23],
  [0.71, 0.145, 25],
  [0.62, 0.185, 27],
  [0.545, 0.188, 27],
  [0.485, 0.172, 27],
]
const LAMP: Ramp = [
  [0.966, 0.036, 92],
  [0.92, 0.076, 89],
  [0.86, 0.12, 84],
  [0.79, 0.145, 77],
  [0.72, 0.148, 71],
  [0.64, 0.136, 67],
  [0.53, 0.114, 64],
  [0.42, 0.088, 60],
]

const steps = (name: string, description: string, ramp: Ramp): DemoToken[] =>
  ramp.map(([lightness, chroma, hue], at) => ({
    name: `${name}.${at + 1}`,
    value: `oklch(${lightness} ${chroma} ${hue})`,
    ...(at === 0 ? { description } : {}),
    message: `Palette: ${name}`,
  }))

/** The sources that the rest of the ledger is made of. */
export const palette: readonly DemoToken[] = [
  ...steps('sea', 'From spray to the deep', SEA),
  ...steps('sand', 'From sailcloth to peat', SAND),
  ...steps('fog', 'Greys with the sea in them', FOG),
  ...steps('kelp', 'Green, for what runs', KELP),
  ...steps('buoy', 'Red, for what is wrong', BUOY),
  ...steps('lamp', 'Amber, for what is late', LAMP),
]
