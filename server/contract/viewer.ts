/** Who is asking. Made by server/auth, handed to every data function. */
export const ROLES = ['owner', 'coach', 'member'] as const
export type Role = (typeof ROLES)[number]

export interface Viewer {
  personId: string
  membershipId: string
  gymId: string
  roles: readonly Role[]
  name: string
  email: string
  gym: { name: string; place: string; timeZone: string }
  /** Every gym that the person belongs to and is active in. */
  gyms: readonly { gymId: string; name: string }[]
}
