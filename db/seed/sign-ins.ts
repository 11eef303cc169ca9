/** The sign-ins that the start command prints for the demo gym. */
import { DEMO_PASSWORD, demoMembers, demoStaff } from './people'

const emailOf = (name: string) =>
  [...demoStaff, ...demoMembers].find((person) => person.name === name)?.email ?? ''

export const demoSignIns = [
  {
    who: 'member',
    name: 'Agnes Thorsby',
    email: emailOf('Agnes Thorsby'),
    password: DEMO_PASSWORD,
  },
  { who: 'member', name: 'Dov Lindgren', email: emailOf('Dov Lindgren'), password: DEMO_PASSWORD },
  { who: 'coach', name: 'Tomasz Brandt', email: emailOf('Tomasz Brandt'), password: DEMO_PASSWORD },
  {
    who: 'coach who also trains',
    name: 'Ifeoma Adeyemi',
    email: emailOf('Ifeoma Adeyemi'),
    password: DEMO_PASSWORD,
  },
  {
    who: 'owner',
    name: 'Marta Lindqvist',
    email: emailOf('Marta Lindqvist'),
    password: DEMO_PASSWORD,
  },
]
