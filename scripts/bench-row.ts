/** One figure against its bar. */
export interface BenchRow {
  what: string
  measured: string
  bar: string
  isHeld: boolean
}
