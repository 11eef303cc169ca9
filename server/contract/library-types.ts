/** What the library's pages are told: the list's rows, and one movement. */
import type { Movement } from '../engine/spec/movement'
import type { IMPACTS, JOINTS, PATTERNS, POSITIONS } from '../engine/spec/names'

export type Pattern = (typeof PATTERNS)[number]
export type Position = (typeof POSITIONS)[number]
export type Impact = (typeof IMPACTS)[number]
export type Joint = (typeof JOINTS)[number]

export interface LibraryRow {
  slug: string
  name: string
  pattern: Pattern
  position: Position
  impact: Impact
  joints: Joint[]
  kit: string[]
  /** Of all options, the planned one among them. */
  options: number
  /** Of the easier and harder ones. */
  optionNames: string[]
  /** `copy`: the gym's own, in place of the built-in of the same slug. */
  origin: 'built-in' | 'copy' | 'own'
  archived: boolean
  figure: string | null
}

export interface LibraryMovement {
  movement: Movement
  origin: LibraryRow['origin']
  archived: boolean
  /** Stands for what was read: a change that is based on an older one is refused. */
  token: string
  /** Classes whose latest version has it, by title. */
  usedIn: { classId: string; title: string }[]
  /** Dates ahead whose version has it. */
  ahead: number
}
