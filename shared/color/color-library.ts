import {
  type Color,
  converter,
  modeA98,
  modeHsl,
  modeHwb,
  modeLab,
  modeLab65,
  modeLch,
  modeLrgb,
  modeOklab,
  modeOklch,
  modeP3,
  modeProphoto,
  modeRgb,
  modeXyz50,
  modeXyz65,
  parse,
  useMode as registerMode,
} from 'culori/fn'

// The library knows a space only once it is registered; only these, so that the console ships no others.
for (const mode of [
  modeRgb,
  modeLrgb,
  modeHsl,
  modeHwb,
  modeLab,
  modeLab65,
  modeLch,
  modeOklab,
  modeOklch,
  modeP3,
  modeA98,
  modeProphoto,
  modeXyz50,
  modeXyz65,
]) {
  registerMode(mode)
}

type CssRgbMode = 'rgb' | 'lrgb' | 'p3' | 'a98' | 'prophoto'
type CssOtherMode = 'xyz50' | 'xyz65' | 'hsl' | 'hwb' | 'lab' | 'lch' | 'oklab' | 'oklch'
/** What CSS text can be once it is read: the spaces that CSS Color 4 writes, as the library holds them. */
export type ParsedColor = Extract<Color, { mode: CssRgbMode | CssOtherMode }>

/** Reads CSS text with the library's grammar; it throws on a term it does not know. */
export const parseWithLibrary = (text: string) => parse(text) as ParsedColor | undefined
/** Converts a library colour to OKLCH, unrounded. */
export const toLibraryOklch = converter('oklch')
/** Converts a library colour to CIE Lab with white D65, unrounded. */
export const toLibraryLab65 = converter('lab65')
/** Converts a library colour to gamma-coded sRGB, unclamped. */
export const toLibraryRgb = converter('rgb')
/** Converts a library colour to linear-light sRGB, unclamped. */
export const toLibraryLinearRgb = converter('lrgb')
/** Converts a library colour to Display P3, unclamped. */
export const toLibraryP3 = converter('p3')
/** Converts a library colour to CIE XYZ with white D65; Y of white is 1. */
export const toLibraryXyz65 = converter('xyz65')
/** Converts a library colour to CIE XYZ with white D50; Y of white is 1. */
export const toLibraryXyz50 = converter('xyz50')
/** Converts a library colour to CIE Lab with white D50, as CSS has it. */
export const toLibraryLab = converter('lab')
/** Converts a library colour to CIE LCH with white D50, as CSS has it. */
export const toLibraryLch = converter('lch')
/** Converts a library colour to OKLab. */
export const toLibraryOklab = converter('oklab')
/** Converts a library colour to HSL; saturation and lightness 0 to 1. */
export const toLibraryHsl = converter('hsl')
/** Converts a library colour to HWB; whiteness and blackness 0 to 1. */
export const toLibraryHwb = converter('hwb')
