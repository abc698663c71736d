/** A 3 × 3 matrix, row by row. */
export type Matrix3 = readonly [
  number,
  number,
  number,
  number,
  number,
  number,
  number,
  number,
  number,
]

/**
 * Multiplies two matrices: the result applies `second` first, then `first`.
 * @returns Unrounded doubles.
 */
export function productOf(first: Matrix3, second: Matrix3): Matrix3 {
  const [a, b, c, d, e, f, g, h, i] = first
  const [j, k, l, m, n, o, p, q, r] = second
  return [
    a * j + b * m + c * p,
    a * k + b * n + c * q,
    a * l + b * o + c * r,
    d * j + e * m + f * p,
    d * k + e * n + f * q,
    d * l + e * o + f * r,
    g * j + h * m + i * p,
    g * k + h * n + i * q,
    g * l + h * o + i * r,
  ]
}

// Fractions and decimals as printed in CSS Color 4, sample code for color conversions (conversions.js at
// w3c/csswg-drafts@064b9815): https://www.w3.org/TR/css-color-4/#color-conversion-code

const LINEAR_SRGB_TO_XYZ: Matrix3 = [
  506752 / 1228815,
  87881 / 245763,
  12673 / 70218,
  87098 / 409605,
  175762 / 245763,
  12673 / 175545,
  7918 / 409605,
  87881 / 737289,
  1001167 / 1053270,
]

const XYZ_TO_LINEAR_SRGB: Matrix3 = [
  12831 / 3959,
  -329 / 214,
  -1974 / 3959,
  -851781 / 878810,
  1648619 / 878810,
  36519 / 878810,
  705 / 12673,
  -2585 / 12673,
  705 / 667,
]

const LINEAR_P3_TO_XYZ: Matrix3 = [
  608311 / 1250200,
  189793 / 714400,
  198249 / 1000160,
  35783 / 156275,
  247089 / 357200,
  198249 / 2500400,
  0,
  32229 / 714400,
  5220557 / 5000800,
]

const XYZ_TO_LINEAR_P3: Matrix3 = [
  446124 / 178915,
  -333277 / 357830,
  -72051 / 178915,
  -14852 / 17905,
  63121 / 35810,
  423 / 17905,
  11844 / 330415,
  -50337 / 660830,
  316169 / 330415,
]

/** Linear Rec. 2020 to XYZ D65, from the primaries and white of ITU-R BT.2020. */
export const LINEAR_REC2020_TO_XYZ: Matrix3 = [
  63426534 / 99577255,
  20160776 / 139408157,
  47086771 / 278816314,
  26158966 / 99577255,
  472592308 / 697040785,
  8267143 / 139408157,
  0,
  19567812 / 697040785,
  295819943 / 278816314,
]

/** CIE XYZ D65 to the cone responses that OKLab starts from. */
export const XYZ_TO_LMS: Matrix3 = [
  0.819022437996703, 0.3619062600528904, -0.1288737815209879, 0.0329836539323885,
  0.9292868615863434, 0.0361446663506424, 0.0481771893596242, 0.2642395317527308,
  0.6335478284694309,
]

const LMS_TO_XYZ: Matrix3 = [
  1.2268798758459243, -0.5578149944602171, 0.2813910456659647, -0.0405757452148008,
  1.112286803280317, -0.0717110580655164, -0.0763729366746601, -0.4214933324022432,
  1.5869240198367816,
]

/** Cube roots of LMS to OKLab. */
export const LMS_ROOTS_TO_OKLAB: Matrix3 = [
  0.210454268309314, 0.7936177747023054, -0.0040720430116193, 1.9779985324311684,
  -2.4285922420485799, 0.450593709617411, 0.0259040424655478, 0.7827717124575296,
  -0.8086757549230774,
]

/** OKLab to cube roots of LMS. */
export const OKLAB_TO_LMS_ROOTS: Matrix3 = [
  1, 0.3963377773761749, 0.2158037573099136, 1, -0.1055613458156586, -0.0638541728258133, 1,
  -0.0894841775298119, -1.2914855480194092,
]

/** LMS to linear sRGB. */
export const LMS_TO_LINEAR_SRGB = productOf(XYZ_TO_LINEAR_SRGB, LMS_TO_XYZ)

/** LMS to linear Display P3. */
export const LMS_TO_LINEAR_P3 = productOf(XYZ_TO_LINEAR_P3, LMS_TO_XYZ)

/** Linear sRGB to LMS. */
export const LINEAR_SRGB_TO_LMS = productOf(XYZ_TO_LMS, LINEAR_SRGB_TO_XYZ)

/** Linear Display P3 to LMS. */
export const LINEAR_P3_TO_LMS = productOf(XYZ_TO_LMS, LINEAR_P3_TO_XYZ)

/** Linear sRGB to linear Display P3. */
export const LINEAR_SRGB_TO_LINEAR_P3 = productOf(XYZ_TO_LINEAR_P3, LINEAR_SRGB_TO_XYZ)
