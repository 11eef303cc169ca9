/** What classes are fitted to: what a member's body objects to, what they have, what they want. */
import { z } from 'zod'
import type { Reason } from '../engine/spec/movement'

/** Notes that a member keeps of their own body; what kit brings with it is no note. */
export const BODY_NOTES = [
  'knee',
  'hip',
  'ankle-or-foot',
  'lower-back',
  'neck',
  'shoulder',
  'wrist',
  'no-jumping',
  'cannot-get-down',
  'cannot-kneel',
  'balance',
] as const satisfies readonly Reason[]
export type BodyNote = (typeof BODY_NOTES)[number]

export const BODY_NOTE_TEXT: Readonly<Record<BodyNote, string>> = {
  knee: 'Knee',
  hip: 'Hip',
  'ankle-or-foot': 'Ankle or foot',
  'lower-back': 'Lower back',
  neck: 'Neck',
  shoulder: 'Shoulder',
  wrist: 'Wrist',
  'no-jumping': 'No jumping',
  'cannot-get-down': 'Not down to the floor',
  'cannot-kneel': 'Not on my knees',
  balance: 'Balance is hard',
}

/** What a class is fitted to. Health data: the member's own, and their coaches'. */
export interface FitProfile {
  bodyNotes: BodyNote[]
  wantsMore: boolean
  /** Item → how many. */
  kit: Record<string, number>
  /** Item → kilograms of the pieces, as far as they are known. */
  kitWeights: Record<string, number[]>
  /** A coach's own word for this member: movement → option. */
  rules: { movement: string; option: string; setBy: string | null; since: string }[]
}

export const fitInput = z.object({
  bodyNotes: z.array(z.enum(BODY_NOTES)).max(BODY_NOTES.length),
  wantsMore: z.boolean(),
})

export const optionRuleInput = z.object({
  membershipId: z.string().min(1).max(64),
  movement: z.string().min(1, 'Choose the movement.').max(60),
  /** Empty: the rule is taken back. */
  option: z.string().max(60),
})
