/** Where a pair occurs: everywhere, or in places ticked one by one. */
export function Places<Place extends string>({
  legend,
  all,
  always,
  places,
  chosen,
  fault,
  onChange,
}: {
  legend: string
  /** What stands for no limit, as a sentence says it. */
  all: string
  /** A place that is always in. */
  always?: string
  places: readonly Place[]
  /** Absent: all. */
  chosen: readonly Place[] | undefined
  fault: string | undefined
  onChange: (chosen: readonly Place[] | undefined) => void
}) {
  const toggle = (place: Place, isIn: boolean) =>
    onChange(places.filter((each) => (each === place ? isIn : (chosen ?? []).includes(each))))
  return (
    <fieldset className="min-w-0">
      <legend className="text-12 text-ink-soft">{legend}</legend>
      <div className="mt-4 flex flex-wrap gap-x-20 gap-y-4">
        <Tick
          text={all}
          isIn={chosen === undefined}
          onChange={(isAll) => onChange(isAll ? undefined : [...places])}
        />
        {chosen !== undefined && always !== undefined && <Tick text={always} isIn isFixed />}
        {chosen !== undefined &&
          places.map((place) => (
            <Tick
              key={place}
              text={place}
              isIn={chosen.includes(place)}
              onChange={(isIn) => toggle(place, isIn)}
            />
          ))}
      </div>
      {fault !== undefined && <p className="mt-4 text-13 font-semibold text-madder">{fault}</p>}
    </fieldset>
  )
}

function Tick({
  text,
  isIn,
  isFixed = false,
  onChange,
}: {
  text: string
  isIn: boolean
  isFixed?: boolean
  onChange?: (isIn: boolean) => void
}) {
  return (
    <label className="flex min-h-28 items-center gap-x-8">
      <input
        type="checkbox"
        checked={isIn}
        disabled={isFixed}
        onChange={(event) => onChange?.(event.target.checked)}
        className="size-16 accent-ink"
      />
      {text}
    </label>
  )
}
