/** One colour as it is seen, a bar of it on its ground. */
export function ColorSample({ color, ground }: { color: string; ground: string }) {
  return (
    <svg viewBox="0 0 56 20" width="56" height="20" aria-hidden="true" className="own-colors block">
      <rect width="56" height="20" fill={ground} />
      <rect x="4" y="4" width="48" height="12" fill={color} />
      <path d="M.5.5h55v19H.5z" fill="none" className="stroke-feint" />
    </svg>
  )
}
