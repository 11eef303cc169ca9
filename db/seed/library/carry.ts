/** Library: carry. The words are the project's own; form and faults: common practice, no source. */
import type { Movement } from '@/server/engine/spec/movement'

export const carryMovements: Movement[] = []
