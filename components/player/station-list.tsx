'use client'
import clsx from 'clsx'
import { figureOf, repsNow, type StationView } from './scene'
import { StationFigure } from './station-figure'
import styles from './floor-plan.module.css'
import { usePlayerUi } from './player-ui'
import { reasonsText } from './option-column'
import { schemeText, sidesText } from './texts'

/** What a station asks for, in the shortest words: '4, 6, 8 …', '0:40', '12 each side'. */
export function stationAmount(view: StationView): string {
  const station = view.station
  if (view.reps !== null) return schemeText(view.reps)
  const seconds = 'work' in station ? station.work : 'seconds' in station ? station.seconds : 0
  return seconds < 60
    ? `${seconds} s`
    : `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, '0')}`
}

/** Under a name in a list: nothing where all is as planned and on both sides at once. */
function underline(view: StationView): string {
  const planned = view.option === null || view.option.level === 'as-planned'
  return [sidesText(view.sides), planned ? null : optionLine(view)].filter(Boolean).join(', ')
}

function optionLine(view: StationView): string {
  const option = view.option
  if (!option || option.level === 'as-planned') return 'as planned'
  const reasons = reasonsText(option)
  return reasons && option.level === 'easier' ? `${option.name}: ${reasons}` : option.name
}

/**
 * The stations of a block that is coming: a figure of the first and a bay for each, as many as
 * there is room for, the rest as a number. Each opens its options.
 */
export function ComingStations({
  views,
  kit,
  first = false,
  max,
}: {
  views: readonly StationView[]
  kit: string | null
  /** Show the reps of the first round only, as a large figure. */
  first?: boolean
  max: number
}) {
  const ui = usePlayerUi()
  const shown = views.length > max ? views.slice(0, max - 1) : views
  const more = views.length - shown.length
  const lead = views[0]
  return (
    <div className={styles.middle}>
      <div className={styles.figure} style={{ gridColumn: '1 / 3' }}>
        {lead ? <StationFigure view={lead} figure={figureOf(lead)} moving side={null} /> : null}
      </div>
      <ul className={clsx(styles.options, styles.coming, 'self-end border-line')}>
        {shown.map((view) => (
          <li key={view.key} className="border-t-[length:var(--weight)] border-line">
            <button
              type="button"
              onClick={() => ui.open('options', view.key)}
              className="flex min-h-12 w-full items-center gap-[0.6em] px-[0.5em] py-[0.25em] text-left leading-[1.05] hover:bg-fill"
            >
              <span className="min-w-[1.4em] figures text-[length:calc(var(--near)*1.15)] leading-none whitespace-nowrap">
                {first ? (repsNow(view, 1) ?? stationAmount(view)) : stationAmount(view)}
              </span>
              <span className="min-w-0 flex-1 condensed">
                <span className="block truncate pb-[0.06em] text-[length:var(--near)]">
                  {view.name}
                </span>
                {underline(view) ? (
                  <span className="block truncate pb-[0.08em] text-[length:calc(var(--near)*0.82)] font-medium text-text-quiet">
                    {underline(view)}
                  </span>
                ) : null}
              </span>
            </button>
          </li>
        ))}
        {more > 0 || kit ? (
          <li className="border-t-[length:var(--weight)] border-line px-[0.5em] py-[0.3em] condensed text-[length:calc(var(--near)*0.9)] leading-tight">
            {more > 0 ? `and ${more} more` : null}
            {more > 0 && kit ? ' · ' : null}
            {kit}
          </li>
        ) : null}
      </ul>
    </div>
  )
}

/** A brief shows every station: figure, reps, option. Beyond a handful the figures give way. */
export function BriefStations({ views }: { views: readonly StationView[] }) {
  const ui = usePlayerUi()
  const drawn = views.length <= 4
  return (
    <div className={styles.stations}>
      {drawn ? (
        <ul className="grid h-full min-h-0 min-w-0 auto-cols-fr grid-flow-col">
          {views.map((view) => (
            <li
              key={view.key}
              className="grid min-h-0 min-w-0 grid-rows-[minmax(0,1fr)_auto] border-line not-first:border-l-[length:calc(var(--weight)*0.6)]"
            >
              <div className={styles.figure} style={{ gridArea: 'auto' }}>
                <StationFigure view={view} figure={figureOf(view)} moving side={null} />
              </div>
              <button
                type="button"
                onClick={() => ui.open('options', view.key)}
                className="min-h-12 min-w-0 px-[0.6em] py-[0.3em] text-left leading-[1.05] hover:bg-fill"
              >
                <StationWords view={view} />
              </button>
            </li>
          ))}
        </ul>
      ) : (
        <ol className="grid h-full min-h-0 min-w-0 auto-rows-max grid-cols-2 content-end gap-x-4 overflow-y-auto md:grid-cols-3">
          {views.map((view) => (
            <li key={view.key} className="min-w-0">
              <button
                type="button"
                onClick={() => ui.open('options', view.key)}
                aria-label={`${stationAmount(view)} ${view.name}, ${underline(view) || 'as planned'}`}
                className="block min-h-12 w-full truncate text-left condensed text-[length:var(--near)] leading-[1.1] hover:bg-fill"
              >
                <span className="mr-[0.35em] figures">{stationAmount(view)}</span>
                {view.name}
              </button>
            </li>
          ))}
        </ol>
      )}
    </div>
  )
}

function StationWords({ view }: { view: StationView }) {
  return (
    <>
      <span className="block truncate condensed text-[length:calc(var(--near)*1.1)] font-bold">
        <span className="mr-[0.35em] figures">{stationAmount(view)}</span>
        {view.name}
      </span>
      <span className="block truncate pb-[0.1em] condensed text-[length:calc(var(--near)*0.85)] font-medium text-text-quiet">
        {[sidesText(view.sides), optionLine(view)].filter(Boolean).join(', ')}
      </span>
    </>
  )
}
