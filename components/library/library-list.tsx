'use client'
import { useSearchParams } from 'next/navigation'
import Link from 'next/link'
import { memo, useDeferredValue, useEffect, useMemo, useState } from 'react'
import { Button, LinkButton } from '@/components/ui/button'
import { Empty } from '@/components/ui/empty'
import { Part } from '@/components/ui/heading'
import { plural } from '@/server/contract/format'
import type { LibraryRow } from '@/server/contract/library-types'
import {
  filterLibrary,
  libraryQuery,
  parseLibraryFilter,
  WHOLE_LIBRARY,
  type LibraryFilter,
} from '@/server/contract/library-filter'
import { kitWords, ORIGIN_TEXT, patternText, positionText } from '@/server/contract/library-words'
import { paths } from '@/server/contract/paths'
import { PATTERNS } from '@/server/engine/spec/names'
import { SheetFigure } from './figure-sheet'
import { LibraryFilters } from './library-filters'

/** Browsers slow down a page that writes its address with every letter. */
const ADDRESS_AFTER_MS = 250

/** The filter in hand. The address follows it; an address that somebody else has set is followed. */
function useLibraryFilter(): [LibraryFilter, (filter: LibraryFilter) => void] {
  const address = useSearchParams().toString()
  const [filter, setFilter] = useState(() => parseLibraryFilter(new URLSearchParams(address)))
  const [seen, setSeen] = useState(address)
  const query = libraryQuery(filter)
  if (address !== seen) {
    setSeen(address)
    if (address !== query) setFilter(parseLibraryFilter(new URLSearchParams(address)))
  }
  useEffect(() => {
    const timer = setTimeout(() => {
      if (new URLSearchParams(location.search).toString() === query) return
      history.replaceState(null, '', query ? `${paths.library()}?${query}` : paths.library())
    }, ADDRESS_AFTER_MS)
    return () => clearTimeout(timer)
  }, [query])
  return [filter, setFilter]
}

/** The library by pattern, filtered as it is typed. Its figures stand in the page's sheet. */
export function LibraryList({ rows }: { rows: readonly LibraryRow[] }) {
  const [filter, setFilter] = useLibraryFilter()
  const shownFilter = useDeferredValue(filter)
  const shown = useMemo(() => filterLibrary(rows, shownFilter), [rows, shownFilter])
  const kit = useMemo(() => [...new Set(rows.flatMap((row) => row.kit))].sort(), [rows])
  if (rows.length === 0) {
    return (
      <div className="mt-6">
        <Empty>
          <p>The library is empty: no movement has been written yet.</p>
          <LinkButton href={paths.newMovement()}>Write the first</LinkButton>
        </Empty>
      </div>
    )
  }
  return (
    <>
      <LibraryFilters filter={filter} setFilter={setFilter} kit={kit} address={paths.library()} />
      <p className="mt-4 text-text-quiet" aria-live="polite">
        {plural(shown.length, 'movement')}
      </p>
      {shown.length === 0 ? (
        <Empty>
          <p>
            {filter.show === 'archived' && libraryQuery({ ...filter, show: 'ready' }) === ''
              ? 'Nothing is archived.'
              : 'No movement fits this.'}
          </p>
          <Button look="outlined" onClick={() => setFilter(WHOLE_LIBRARY)}>
            Show the whole library
          </Button>
        </Empty>
      ) : (
        PATTERNS.map((pattern) => {
          const group = shown.filter((row) => row.pattern === pattern)
          return group.length === 0 ? null : (
            <Part
              key={pattern}
              title={patternText(pattern)}
              beside={<span className="text-text-quiet">{group.length}</span>}
              className="mt-8"
            >
              <ul className="grid grid-cols-[repeat(auto-fill,minmax(min(19rem,100%),1fr))] gap-x-8">
                {group.map((row) => (
                  <Tile key={row.slug} row={row} />
                ))}
              </ul>
            </Part>
          )
        })
      )}
    </>
  )
}

/** One movement: who does it stands on the line, and what it is beside it. Off screen it is not drawn. */
const Tile = memo(function Tile({ row }: { row: LibraryRow }) {
  const kit = kitWords(row.kit)
  return (
    <li className="relative flex min-h-34 gap-4 border-b-4 border-fill pt-3 [contain-intrinsic-size:auto_7.5rem] [content-visibility:auto] hover:border-present has-focus-visible:border-present">
      <SheetFigure figure={row.figure} className="h-31 w-28 shrink-0 self-end" />
      <div className="min-w-0 flex-1 self-center pb-2 leading-snug">
        <Link
          href={paths.movement(row.slug)}
          prefetch={false}
          className="font-display text-xl leading-tight font-bold [overflow-wrap:anywhere] decoration-3 underline-offset-4 after:absolute after:inset-0 hover:underline"
        >
          {row.name}
        </Link>
        <p className="mt-0.5 text-[0.9em] text-text-quiet">
          {positionText(row.position)}, {kit === '' ? 'no kit' : kit}
        </p>
        <p className="text-[0.9em] text-text-quiet">
          {plural(row.options, 'option')}
          {row.origin === 'built-in' ? null : (
            <strong className="text-text">, {ORIGIN_TEXT[row.origin].toLowerCase()}</strong>
          )}
        </p>
      </div>
    </li>
  )
})
