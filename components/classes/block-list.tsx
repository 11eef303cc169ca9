import { StillFigure } from '@/components/figure/still-figure'
import {
  forecastBasisText,
  forecastText,
  formatText,
  stationNames,
  stationText,
  workNumber,
} from '@/server/contract/block-text'
import type { ForecastDto } from '@/server/contract/paces'
import type { FittedStation } from '@/server/engine/fit/fit'
import type { AnyStation, Block } from '@/server/engine/spec/schema'
import type { PublishedVersion } from '@/server/engine/spec/version'

/** Every block of a class with its stations, and the easier and harder ways of each. */
export function BlockList({
  version,
  forecasts,
  fitted,
}: {
  version: PublishedVersion
  forecasts: readonly ForecastDto[]
  /** The reader's own; empty for somebody who only reads. */
  fitted: readonly FittedStation[]
}) {
  return (
    <ol>
      {version.spec.blocks.map((block) =>
        block.format.type === 'rest' ? null : (
          <BlockRow
            key={block.id}
            version={version}
            block={block}
            stations={block.format.stations}
            forecast={forecasts.find((one) => one.block === block.id)}
            fitted={fitted.filter((one) => one.block === block.id)}
          />
        ),
      )}
    </ol>
  )
}

interface BlockRowProps {
  version: PublishedVersion
  block: Block
  stations: readonly AnyStation[]
  forecast: ForecastDto | undefined
  fitted: readonly FittedStation[]
}

function BlockRow({ version, block, stations, forecast, fitted }: BlockRowProps) {
  const number = workNumber(version.spec.blocks, block)
  return (
    <li className="grid gap-x-8 gap-y-4 border-t-4 border-line pt-3 pb-7 sm:grid-cols-[11rem_1fr]">
      <div>
        <h3 className="flex items-baseline gap-3 text-2xl">
          {number === null ? null : <span className="figures text-3xl">{number}</span>}
          {block.title}
        </h3>
        <p className="mt-1 text-text-quiet">{formatText(block)}</p>
        {forecast ? (
          <p className="mt-1 leading-snug">
            Forecast <strong className="tabular-nums">{forecastText(forecast)}</strong>
            <span className="block text-[0.9em] text-text-quiet">
              {forecastBasisText(forecast)}
            </span>
          </p>
        ) : null}
      </div>
      <ul className="space-y-4">
        {stations.map((station, index) => (
          <Station
            key={index}
            version={version}
            station={station}
            fitted={fitted.find((one) => one.station === index)}
          />
        ))}
      </ul>
    </li>
  )
}

function Station({
  version,
  station,
  fitted,
}: {
  version: PublishedVersion
  station: AnyStation
  fitted: FittedStation | undefined
}) {
  const { name, easier, harder } = stationNames(version, station)
  const movement = version.movements.find((one) => one.slug === station.movement)
  const option = movement?.options.find((one) => one.option === fitted?.option)
  const figure = option?.figure ?? movement?.figure ?? station.movement
  return (
    <li className="grid grid-cols-[5.5rem_1fr] gap-x-4">
      <div className="flex h-17 items-end justify-center border-b-4 border-fill">
        <StillFigure figure={figure} frame="stature" label="" className="-mt-4 h-21 max-w-full" />
      </div>
      <div className="grid content-start gap-x-6 gap-y-1.5 xl:grid-cols-[12rem_1fr]">
        <p className="leading-snug">
          <strong className="block">{name}</strong>
          <span className="text-text-quiet">{stationText(station)}</span>
        </p>
        <dl className="grid gap-x-6 gap-y-1 lg:grid-cols-[6fr_5fr]">
          <Ways key="easier" digit="1" word="Easier" names={easier} />
          <Ways key="harder" digit="3" word="Harder" names={harder} />
        </dl>
        {fitted && (fitted.why !== null || fitted.conflicts.length > 0) ? (
          <div className="space-y-1 xl:col-span-2">
            {fitted.why ? (
              <p className="border-l-6 border-rest pl-2.5 leading-snug">{fitted.why}</p>
            ) : null}
            {fitted.conflicts.map((conflict) => (
              <p key={conflict} className="border-l-6 border-stop pl-2.5 leading-snug">
                {conflict}
              </p>
            ))}
          </div>
        ) : null}
      </div>
    </li>
  )
}

/** The digit is the key that chooses it in class. */
function Ways({ digit, word, names }: { digit: string; word: string; names: readonly string[] }) {
  if (names.length === 0) return null
  return (
    <div className="flex gap-2.5 leading-snug">
      <dt className="shrink-0">
        <span
          aria-hidden
          className="flex size-6 items-center justify-center border-2 border-line-lesser text-[0.85rem] font-bold text-text-quiet"
        >
          {digit}
        </span>
        <span className="sr-only">{word}</span>
      </dt>
      <dd>{names.join(', or ').toLowerCase()}</dd>
    </div>
  )
}
