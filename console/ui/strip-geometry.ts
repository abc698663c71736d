/** What a band shows: one token, or a group of them where there are too many. */
export interface StripBand {
  readonly name: string
  readonly href: string
  readonly light: string
  readonly dark: string
  /** Which half is cut. */
  readonly breach?: 'light' | 'dark' | 'both'
  /** A token that is only the background of a breach has a thinner stitch. */
  readonly breachOnIt?: boolean
}

export interface PlacedBand extends StripBand {
  readonly index: number
  readonly top: number
  readonly high: number
}

/** Over this many tokens a band stands for a group. */
export const MOST_BANDS = 300

const GROUP_GAP = 3

/** The bands with their places, px from the top: one px of ground between them, three between groups. */
export function placeBands(
  groups: readonly (readonly StripBand[])[],
  height: number,
): PlacedBand[] {
  const filled = groups.filter((group) => group.length > 0)
  const count = filled.reduce((sum, group) => sum + group.length, 0)
  if (count === 0) return []
  const gap = count > height / 2 ? 0 : GROUP_GAP
  const pitch = (height - gap * (filled.length - 1)) / count
  const high = pitch > 2 ? pitch - 1 : pitch
  return filled.flatMap((group, groupIndex) => {
    const before = filled.slice(0, groupIndex).reduce((sum, each) => sum + each.length, 0)
    return group.map((band, place) => {
      const index = before + place
      return { ...band, index, top: index * pitch + groupIndex * gap, high }
    })
  })
}

/** Bands for the strip: one a token, or one a group with the worst of it in front. */
export function stripGroups(
  bands: readonly StripBand[],
  groupHref: (group: string) => string,
): StripBand[][] {
  const groups = new Map<string, StripBand[]>()
  for (const band of bands) {
    const name = groupOf(band.name)
    groups.set(name, [...(groups.get(name) ?? []), band])
  }
  if (bands.length <= MOST_BANDS) return [...groups.values()]
  const worst = [...groups].flatMap(([name, members]) => {
    const shown = members.find((band) => band.breach !== undefined) ?? members[0]
    return shown === undefined ? [] : [{ ...shown, name, href: groupHref(name) }]
  })
  return [worst]
}

/** The first segment of a dot path; a name of one segment is its own group. */
export function groupOf(name: string): string {
  return name.split('.', 1)[0] ?? name
}

/** The band of a token, or of its group where a band stands for a group. */
export function bandOf(bands: readonly PlacedBand[], token: string): PlacedBand | undefined {
  const group = groupOf(token)
  return bands.find(({ name }) => name === token) ?? bands.find(({ name }) => name === group)
}

/** From the band's middle through the gutter to a place on the page, bending in a lane of its own. */
export function leaderPath(bandMiddle: number, targetMiddle: number): string {
  return `M72 ${bandMiddle}H92V${targetMiddle}H108`
}
