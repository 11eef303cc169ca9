import { ClassLane } from './class-lane'
import { Captions } from './captions'
import { Cues } from './cues'
import { Load } from './load'
import { Paces } from './paces'
import { Part, PageTitle } from '@/components/ui/heading'
import { forecastBasisText, forecastText, formatText } from '@/server/contract/block-text'
import { dateOf, lengthText, plural, type DateStyle } from '@/server/contract/format'
import type { StationSwaps, WeeksLoad } from '@/server/contract/load'
import type { ForecastDto, LearntPacesDto } from '@/server/contract/paces'
import type { PlannedClass } from '@/server/contract/planned-classes'
import { classLoad } from '@/server/engine/load/class-load'
import { advise } from '@/server/engine/spec/advice'
import type { Block, SessionSpec } from '@/server/engine/spec/schema'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { realLengthMs } from '@/server/engine/timeline/compile'

interface PlannedClassPageProps {
  planned: PlannedClass
  learnt: LearntPacesDto
  weeks: WeeksLoad
  swaps: readonly StationSwaps[]
  forecasts: readonly ForecastDto[]
  timeZone: string
  dateStyle: DateStyle
}

/** A class as its coach looks at it: forecast, advice, cues, captions, and what its pace rests on. */
export function PlannedClassPage({
  planned,
  learnt,
  weeks,
  swaps,
  forecasts,
  timeZone,
  dateStyle,
}: PlannedClassPageProps) {
  const { version } = planned
  const { spec } = version
  const [latest] = planned.versions
  const advice = advise(version)
  return (
    <article>
      <div className="flex flex-wrap items-end justify-between gap-x-12 gap-y-4 page">
        <div className="min-w-0">
          <PageTitle size="long">{spec.title}</PageTitle>
        </div>
        <div>
          <p className="font-display text-xl font-bold">{lengthText(realLengthMs(version))}</p>
          {spec.focus ? <p className="text-text-quiet">{spec.focus}</p> : null}
          <p className="text-text-quiet">
            {plural(planned.versions.length, 'version')}
            {latest ? `, the last ${dateOf(latest.publishedAt, timeZone, dateStyle)}` : ''}
            {latest?.publishedBy ? ` by ${latest.publishedBy}` : ''}
          </p>
        </div>
      </div>
      <div className="mt-4">
        <ClassLane version={version} />
      </div>
      <div className="mt-8 grid gap-x-12 gap-y-10 page lg:grid-cols-[1.25fr_1fr]">
        <div className="min-w-0 space-y-10">
          <Part title="Blocks">
            <ol>
              {spec.blocks.map((block) => {
                const forecast = forecasts.find((one) => one.block === block.id)
                return (
                  <li
                    key={block.id}
                    className="grid gap-x-6 border-b-4 border-fill py-2.5 sm:grid-cols-[1fr_auto]"
                  >
                    <p className="leading-snug">
                      <strong className="font-display text-lg">{block.title}</strong>
                      <span className="block text-text-quiet">{formatText(block)}</span>
                      <Swaps version={version} block={block} swaps={swaps} />
                    </p>
                    {forecast ? (
                      <p className="leading-snug sm:text-right">
                        Forecast <strong className="tabular-nums">{forecastText(forecast)}</strong>
                        <span className="block text-[0.9em] text-text-quiet">
                          {forecastBasisText(forecast)}
                        </span>
                      </p>
                    ) : null}
                  </li>
                )
              })}
            </ol>
          </Part>
          <Part title="Cues">
            <Cues version={version} />
          </Part>
        </div>
        <div className="min-w-0 space-y-10">
          <Part title="Advice">
            {advice.length === 0 ? (
              <p className="mt-3 text-text-quiet">Nothing to say: it can be led as it is.</p>
            ) : (
              <ul className="mt-3 space-y-2.5">
                {advice.map(({ path, message }) => (
                  <li key={`${path} ${message}`} className="border-l-6 border-present pl-3">
                    <strong>{titleAt(spec, path)}</strong>
                    {message}
                  </li>
                ))}
              </ul>
            )}
          </Part>
          <Part title="What it asks of a body">
            <Load spec={spec} load={classLoad(version)} weeks={weeks} />
          </Part>
          <Part title="Captions" id="captions">
            <Captions planned={planned} />
          </Part>
          <Part title="Pace">
            <Paces version={version} learnt={learnt} />
          </Part>
        </div>
      </div>
    </article>
  )
}

/** How many members a station of the block starts on another option. */
function Swaps({
  version,
  block,
  swaps,
}: {
  version: PublishedVersion
  block: Block
  swaps: readonly StationSwaps[]
}) {
  const own = swaps.filter((one) => one.block === block.id && one.members > 0)
  if (own.length === 0 || block.format.type === 'rest') return null
  const { stations } = block.format
  return (
    <span className="block text-[0.9em] text-text-quiet">
      {own
        .map(({ station, members, of }) => {
          const slug = stations[station]?.movement
          const name = version.movements.find((one) => one.slug === slug)?.name ?? ''
          return `${name}: ${members} of ${of} start on another option`
        })
        .join(' · ')}
    </span>
  )
}

/** 'Row and lunge: ' of a path into that block. */
function titleAt(spec: SessionSpec, path: string): string {
  const index = /^blocks\[(\d+)\]/.exec(path)?.[1]
  const title = index === undefined ? undefined : spec.blocks[Number(index)]?.title
  return title === undefined ? '' : `${title}: `
}
