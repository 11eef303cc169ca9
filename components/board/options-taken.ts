/** Which options a member used, beside those that the coach planned. */
import type { Level } from '@/server/engine/spec/movement'
import { AS_PLANNED } from '@/server/engine/spec/names'
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

/** 'Easier: push-up, reverse lunge'; null where all was as planned. */
export function optionsTaken(row: BoardRow, dto: BoardDto): string | null {
  const taken = (row.tally?.blocks ?? []).flatMap((block) => takenInBlock(dto, block))
  const said = (level: Level, word: string) => {
    const names = new Set(
      taken.filter((one) => one.level === level).map((one) => one.movement.toLowerCase()),
    )
    return names.size > 0 ? [`${word}: ${[...names].join(', ')}`] : []
  }
  const parts = [...said('easier', 'Easier'), ...said('harder', 'Harder')]
  return parts.length > 0 ? parts.join('. ') : null
}
