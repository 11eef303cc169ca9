/** Which options a member used, beside those that the coach planned. */
import type { Level } from '@/server/engine/spec/movement'
import { AS_PLANNED } from '@/server/engine/spec/movement'
import type { BlockTally } from '@/server/engine/tally/types'
import type { BoardDto, BoardRow } from '@/server/contract/board'

export interface TakenOption {
  movement: string
  option: string
  level: Level
}

/** Other options than the planned ones that were in force in a block, in the order of its stations. */
export function takenInBlock(dto: BoardDto, tally: BlockTally): TakenOption[] {
  const format = dto.version.spec.blocks.find((block) => block.id === tally.block)?.format
  if (!format || format.type === 'rest') return []
  return tally.options.flatMap(({ station, used }) => {
    const movement = dto.version.movements.find(
      (one) => one.slug === format.stations[station]?.movement,
    )
    return used
      .filter((slug) => slug !== AS_PLANNED)
      .flatMap((slug) => {
        const option = movement?.options.find((one) => one.option === slug)
        return movement && option
          ? [{ movement: movement.name, option: option.name, level: option.level }]
          : []
      })
  })
}

/** 'Push-up: hands on a table, reverse lunge: step shorter'; null where all was as planned. */
export function optionsTaken(row: BoardRow, dto: BoardDto): string | null {
  const said = new Set<string>()
  for (const block of row.tally?.blocks ?? []) {
    for (const taken of takenInBlock(dto, block)) {
      said.add(`${taken.movement}: ${taken.option.charAt(0).toLowerCase()}${taken.option.slice(1)}`)
    }
  }
  return said.size > 0 ? [...said].join(', ') : null
}
