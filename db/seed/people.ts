/** People of the invented gym. Names, kit and health answers are invented. */
import type { Role } from '@/server/contract/viewer'
import type { HealthQuestion } from '@/server/engine/fit/screening'
import type { Reason } from '@/server/engine/spec/movement'

export interface DemoMember {
  name: string
  email: string
  group: 'Morning group' | 'Evening group'
  kit: Record<string, number>
  /** Seconds per rep against the planned ones: below 1 is quicker. */
  pace: number
  /** Share of scheduled classes that they do. */
  attendance: number
  /** Reasons for which they take an easier option. */
  takes: Reason[]
  wantsMore?: boolean
  /** Health questions answered with yes. */
  yes?: HealthQuestion[]
  cleared?: boolean
  limits?: string[]
  /** Has never answered the health questions. */
  neverAsked?: boolean
  /** Counts after class rather than by pressing. */
  countsAfterwards?: boolean
}

export interface DemoStaff {
  name: string
  email: string
  roles: Role[]
}

export const demoStaff: DemoStaff[] = [
  { name: 'Marta Lindqvist', email: 'marta@quayside.example', roles: ['owner'] },
  { name: 'Tomasz Brandt', email: 'tomasz@quayside.example', roles: ['coach'] },
  { name: 'Ifeoma Adeyemi', email: 'ifeoma@quayside.example', roles: ['coach', 'member'] },
]

const fullKit = { dumbbell: 2, mat: 1, chair: 1 }
const member = (
  name: string,
  group: DemoMember['group'],
  pace: number,
  attendance: number,
  more: Partial<DemoMember> = {},
): DemoMember => ({
  name,
  email: `${name
    .toLowerCase()
    .normalize('NFD')
    .replace(/[\u0300-\u036f]/g, '')
    .split(/[^a-z]+/)
    .filter(Boolean)
    .join('.')}@example.org`,
  group,
  pace,
  attendance,
  kit: fullKit,
  takes: [],
  ...more,
})

export const demoMembers: DemoMember[] = [
  member('Agnes Thorsby', 'Evening group', 1.05, 0.9, { takes: ['lower-back', 'wrist'] }),
  member('Bilal Haddad', 'Evening group', 1.3, 0.7, { takes: ['knee'] }),
  member('Carmen Oyelaran', 'Evening group', 0.88, 0.95, { wantsMore: true }),
  member('Dov Lindgren', 'Evening group', 1, 0.8),
  member('Esther Nakamura', 'Evening group', 1.1, 0.6, { yes: ['medicine'], cleared: true }),
  member('Farid Benali', 'Evening group', 1.02, 0.85, { takes: ['wrist'] }),
  member('Greta Moxley', 'Evening group', 1.2, 0.5, {
    kit: { mat: 1, chair: 1 },
    takes: ['load-too-heavy'],
  }),
  member('Hyun-woo Park', 'Evening group', 0.92, 0.9),
  member('Inés Castellanos-Villaverde', 'Evening group', 1.08, 0.85, { takes: ['shoulder'] }),
  member('Jonas Achterberg', 'Evening group', 1, 0.4, { countsAfterwards: true }),
  member('Kemi Adebayo', 'Evening group', 1, 0.8, {
    kit: { dumbbell: 1, mat: 1 },
    takes: ['only-one-dumbbell'],
  }),
  member('Liam O’Rourke', 'Evening group', 1.15, 0.75),
  member('Mira Petrosyan', 'Morning group', 1, 0, { neverAsked: true }),
  member('Nadia Ferrante', 'Morning group', 1.04, 0.85),
  member('Odile Marchetti', 'Morning group', 1.1, 0.8, { yes: ['known-condition'], cleared: true }),
  member('Pavel Horvat', 'Morning group', 0.95, 0.9, { wantsMore: true }),
  member('Quentin Ashdown', 'Morning group', 1.4, 0.6, {
    takes: ['cannot-get-down', 'balance'],
    yes: ['recent-injury'],
    limits: ['easy-effort', 'no-jumping'],
  }),
  member('Rosa Winterhalter', 'Morning group', 1.18, 0.85, {
    takes: ['no-jumping', 'cannot-kneel'],
  }),
  member('Samir Choudhury', 'Morning group', 1.06, 0.7),
  member('Tove Bergqvist', 'Morning group', 0.97, 0.95),
  member('Uma Krishnan', 'Morning group', 1.12, 0.8, {
    yes: ['pregnant-or-recent-birth'],
    cleared: true,
    takes: ['no-jumping'],
  }),
  member('Viktor Saelens', 'Morning group', 1.25, 0.5, { yes: ['breathless'] }),
  member('Wren Calloway', 'Morning group', 1.01, 0.9, { countsAfterwards: true }),
  member('Yusuf Demir', 'Morning group', 1.03, 0.75, { takes: ['neck'] }),
]

/** One password for every demo account, printed by the start command. */
export const DEMO_PASSWORD = 'harbour-lantern-42'
