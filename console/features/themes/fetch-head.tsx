import { CopySheet } from '#console/ui/copy-sheet.tsx'
import { getResolverFile } from '#shared/contracts/imports.contract.ts'
import { addressOf } from '#shared/contracts/route.ts'
import { getThemeFile, THEME_FORMATS, type ThemeWire } from '#shared/contracts/themes.contract.ts'

/** The files of the head: each theme in each format, and the whole system as one. */
export function FetchHead({
  system,
  themes,
  origin,
}: {
  system: string
  themes: readonly ThemeWire[]
  /** Of this service, as a program reaches it. */
  origin: string
}) {
  const [base] = themes
  if (base === undefined) return null
  const fileOf = (theme: string, format: string) =>
    addressOf(getThemeFile, { system, theme, format })
  return (
    <section aria-labelledby="fetch" className="pt-36 pb-44">
      <h2 id="fetch" className="text-16 font-semibold">
        Fetch
      </h2>
      <p className="mt-2 max-w-640 text-ink-soft">
        The head as it stands, every state resolved. The resolver file is the whole system: rules,
        pairs and themes with it, and read in again the same.
      </p>
      <ul className="double-top mt-12 max-w-640">
        {themes.map(({ key }) => (
          <li
            key={key}
            className="flex min-h-38 flex-wrap items-center gap-x-22 border-b border-feint"
          >
            <span className="min-w-120 flex-1 font-medium break-words">{key}</span>
            {THEME_FORMATS.map((format) => (
              <FileLink key={format} href={fileOf(key, format)} name={`${key}.${format}`} />
            ))}
          </li>
        ))}
        <li className="flex min-h-38 flex-wrap items-center gap-x-22 border-b border-rule">
          <span className="flex-1 font-medium">every theme</span>
          <FileLink href={addressOf(getResolverFile, { system })} name="resolver.json" />
        </li>
      </ul>
      <p className="mt-18 mb-8 max-w-640">
        A program fetches the same with a key in <span className="font-medium">DYEWRIGHT_KEY</span>:
      </p>
      <div className="max-w-820">
        <CopySheet
          label="the command"
          text={`curl -fsS -H "Authorization: Bearer $DYEWRIGHT_KEY" \\\n  -O ${origin}${fileOf(base.key, 'css')}`}
        />
      </div>
    </section>
  )
}

function FileLink({ href, name }: { href: string; name: string }) {
  return (
    <a href={href} download={name} className="word-woad">
      {name}
    </a>
  )
}
