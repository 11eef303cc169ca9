/** What a gym's results have taught about pace, and forecasts that rest on it. */

export interface LearntPaceRow {
  movement: string
  /** A slug; `as-planned` for the coach's own. */
  option: string
  secondsPerRep: number
  /** How many attempts it rests on. */
  attempts: number
  /** By how many reps a block's forecast from earlier results was off, the middle of all; null where none could be held against results. */
  medianErrorReps: number | null
  /** How many forecasts that is the middle of. */
  forecasts: number
}

export interface LearntPacesDto {
  paces: LearntPaceRow[]
  /** f of the forecast, and the attempts that it rests on; null while there are too few. */
  tiring: { factor: number; attempts: number } | null
}

export interface ForecastDto {
  block: string
  rounds: number
  reps: number
  /** `for-time`: when all rounds are done, milliseconds into the block; else null. */
  finishMs: number | null
  /**
   * What it rests on: the planned tempo, or results of the gym (the fewest attempts of its stations, and
   * by how many reps such forecasts were off at most, in the middle).
   */
  basis: { attempts: number; medianErrorReps: number | null } | null
}
