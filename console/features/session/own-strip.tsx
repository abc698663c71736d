import { truncateRatio } from '#shared/checks/finding-words.ts'
import {
  CONSOLE_COLOR_GROUPS,
  type ConsoleColor,
  consoleColor,
  type Shade,
} from '#console/ui/console-colors.ts'
import { contrastRatio, relativeLuminance } from '#shared/color/luminance.ts'

const GROUND = consoleColor('ground')

/** The console's own strip: each colour in both modes on its ground, and what it measures there. */
export function OwnStrip() {
  const groups = CONSOLE_COLOR_GROUPS.map((group) => group.filter((color) => color !== GROUND))
  return (
    <div className="sticky top-0 ml-8 flex h-dvh shrink-0 wide:ml-24 full:ml-72">
      <ul className="own-colors relative flex h-full w-20 flex-col gap-6 border-x border-feint wide:w-48 wide:gap-14 full:w-336 full:gap-28">
        <li aria-hidden="true" className="absolute inset-0 -z-1 flex">
          <span className="flex-1" style={{ background: GROUND.light.hex }} />
          <span className="flex-1" style={{ background: GROUND.dark.hex }} />
        </li>
        {groups.map((group) => (
          <li key={group[0]?.name} style={{ flexGrow: group.length }} className="flex basis-0">
            <ul className="flex flex-1 flex-col gap-1 full:gap-6">
              {group.map((color) => (
                <Band key={color.name} color={color} />
              ))}
            </ul>
          </li>
        ))}
      </ul>
    </div>
  )
}

function Band({ color }: { color: ConsoleColor }) {
  const light = ratioOnGround(color.light, GROUND.light)
  const dark = ratioOnGround(color.dark, GROUND.dark)
  return (
    <li className="relative flex flex-1 px-3 wide:px-6 full:px-40">
      <span className="flex-1" style={{ background: color.light.hex }} />
      <span className="flex-1" style={{ background: color.dark.hex }} />
      <span className="sr-only wide:not-sr-only wide:absolute wide:top-1/2 wide:left-full wide:ml-16 wide:-translate-y-1/2 wide:whitespace-nowrap">
        <span className="block text-13 font-medium">{color.name}</span>
        <span className="figures block text-12 text-ink-soft">
          {light} light, {dark} dark
        </span>
      </span>
    </li>
  )
}

function ratioOnGround(shade: Shade, ground: Shade): string {
  return truncateRatio(contrastRatio(luminanceOf(shade), luminanceOf(ground)), 2)
}

function luminanceOf({ hex }: Shade): number {
  const byte = (at: number) => Number.parseInt(hex.slice(at, at + 2), 16)
  return relativeLuminance(byte(1), byte(3), byte(5))
}
