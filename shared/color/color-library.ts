import {
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

/** Reads CSS text with the library's grammar; it throws on a term it does not know. */
export const parseWithLibrary = parse
/** Converts a library colour to OKLCH, unrounded. */
export const toLibraryOklch = converter('oklch')
/** Converts a library colour to CIE Lab with white D65, unrounded. */
export const toLibraryLab65 = converter('lab65')
