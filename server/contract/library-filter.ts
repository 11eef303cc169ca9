/** What of the library a coach looks at, kept in the address. Pure; the page, its browser side and the data share it. */
import { IMPACTS, JOINTS, PATTERNS, POSITIONS } from '../engine/spec/names'
import type { Impact, Joint, LibraryRow, Pattern, Position } from './library-types'
import { kitWords, patternText } from './library-words'

/** `ready`: what can be planned with. `own`: of these, what the gym wrote or changed. `archived`: put away. */
export const SHOWN = ['ready', 'own', 'archived'] as const
export type Shown = (typeof SHOWN)[number]

export const NO_KIT = 'none'
const SPARES = 'not-'
const MOST_LETTERS = 80

export interface LibraryFilter {
  /** Words that all must be found, in any order. */
  q: string
  pattern: Pattern | null
  position: Position | null
  impact: Impact | null
  /** A joint that it loads or, with `spares`, that it does not load. */
  joint: Joint | null
  spares: boolean
  /** An item that it takes; `NO_KIT`: it takes none. */
  kit: string | null
  /** `every`, which no address asks for: archived or not. */
  show: Shown | 'every'
}

export const WHOLE_LIBRARY: LibraryFilter = {
  q: '',
  pattern: null,
  position: null,
  impact: null,
  joint: null,
  spares: false,
  kit: null,
  show: 'ready',
}

const among = <const T extends string>(list: readonly T[], value: string | null): T | null =>
  list.find((one) => one === value) ?? null

export const EVERY_MOVEMENT: LibraryFilter = { ...WHOLE_LIBRARY, show: 'every' }

/** Anything unreadable in an address is as if it were not there. */
export function parseLibraryFilter(params: URLSearchParams): LibraryFilter {
  const written = params.get('joint') ?? ''
  const negated = written.startsWith(SPARES)
  const joint = among(JOINTS, negated ? written.slice(SPARES.length) : written)
  return {
    q: (params.get('q') ?? '').slice(0, MOST_LETTERS),
    pattern: among(PATTERNS, params.get('pattern')),
    position: among(POSITIONS, params.get('position')),
    impact: among(IMPACTS, params.get('impact')),
    joint,
    spares: negated && joint !== null,
    kit: params.get('kit')?.slice(0, MOST_LETTERS) || null,
    show: among(SHOWN, params.get('show')) ?? 'ready',
  }
}

/** How the joint filter is written in an address and in its select. */
export const jointValue = ({ joint, spares }: Pick<LibraryFilter, 'joint' | 'spares'>): string =>
  joint === null ? '' : `${spares ? SPARES : ''}${joint}`

/** The address's query for a filter; what asks for nothing is left out. */
export function libraryQuery(filter: LibraryFilter): string {
  const params = new URLSearchParams()
  if (filter.q.trim() !== '') params.set('q', filter.q.trim())
  if (filter.pattern) params.set('pattern', filter.pattern)
  if (filter.kit) params.set('kit', filter.kit)
  if (filter.position) params.set('position', filter.position)
  if (filter.joint) params.set('joint', jointValue(filter))
  if (filter.impact) params.set('impact', filter.impact)
  if (filter.show !== 'ready') params.set('show', filter.show)
  return params.toString()
}

/** Small letters without accents: 'Élan' is found by 'elan'. */
const folded = (text: string): string =>
  text.normalize('NFKD').replace(/\p{M}/gu, '').toLocaleLowerCase('en').replaceAll('-', ' ')

/** What a row can be found by. */
function findable(row: LibraryRow): string {
  return folded(
    [row.name, patternText(row.pattern), kitWords(row.kit), ...row.optionNames].join(' '),
  )
}

/** Rows that the filter asks for, in the order given. */
export function filterLibrary(rows: readonly LibraryRow[], filter: LibraryFilter): LibraryRow[] {
  const words = folded(filter.q).split(/\s+/).filter(Boolean)
  return rows.filter(
    (row) =>
      (filter.show === 'every' || row.archived === (filter.show === 'archived')) &&
      (filter.show !== 'own' || row.origin !== 'built-in') &&
      (filter.pattern === null || row.pattern === filter.pattern) &&
      (filter.position === null || row.position === filter.position) &&
      (filter.impact === null || row.impact === filter.impact) &&
      (filter.joint === null || row.joints.includes(filter.joint) !== filter.spares) &&
      (filter.kit === null ||
        (filter.kit === NO_KIT ? row.kit.length === 0 : row.kit.includes(filter.kit))) &&
      (words.length === 0 || containsAll(findable(row), words)),
  )
}

const containsAll = (text: string, words: readonly string[]): boolean =>
  words.every((word) => text.includes(word))
