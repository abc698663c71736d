/**
 * A ratio as logs and messages give it: four decimals, cut off and never rounded, so that 4.49999 never
 * reads 4.5000.
 */
export function truncatedRatio(ratio: number): string {
  const [whole, decimals = ''] = String(ratio).split('.')
  return `${whole}.${decimals.slice(0, 4).padEnd(4, '0')}`
}
