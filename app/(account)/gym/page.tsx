import type { Metadata } from 'next'
import { addDays, format } from 'date-fns'
import { PageFrame } from '@/components/site/page-frame'
import { requireRole } from '@/server/auth/viewer'
import { dayName } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { participation } from '@/server/data/boards'
import { listBetween, localDay } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { getGymOverview } from '@/server/data/people'

export const metadata: Metadata = { title: 'Gym' }

export default async function GymPage() {
  const viewer = await requireRole(paths.gym(), 'owner')
  const db = defaultDb()
  const gym = await getGymOverview(viewer, {}, db)
  const today = localDay(viewer.gym.timeZone, new Date())
  const from = format(addDays(new Date(`${today}T12:00:00`), -28), 'yyyy-MM-dd')
  const classes = await listBetween(viewer, { from, to: today }, db)
  const counts = await participation(
    viewer,
    { scheduledClassIds: classes.map((one) => one.scheduledClassId) },
    db,
  )
  const members = gym.people.filter(
    (person) => person.roles.includes('member') && !person.deactivated,
  )
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <h1 className="text-6xl font-extrabold sm:text-7xl">{gym.name}</h1>
        <p className="mt-2 text-text-quiet">{gym.place}</p>
        <dl className="mt-6 flex flex-wrap gap-x-12 gap-y-4">
          <Fact term="Members" value={String(members.length)} />
          <Fact term="Time zone" value={gym.timeZone} />
          <Fact term="Health questions again after" value={`${gym.healthIntervalDays} days`} />
          <Fact
            term="Emergency number"
            value={gym.emergencyNumber ?? 'not set: members read ‘your local emergency number’'}
          />
        </dl>
        <div className="mt-12 grid gap-x-14 gap-y-12 xl:grid-cols-[3fr_2fr]">
          <section>
            <h2 className="border-b-4 border-line pb-1 text-3xl">People</h2>
            <table className="w-full text-left">
              <thead className="sr-only">
                <tr>
                  <th scope="col">Name</th>
                  <th scope="col">E-mail</th>
                  <th scope="col">Roles</th>
                  <th scope="col">Group</th>
                </tr>
              </thead>
              <tbody>
                {gym.people.map((person) => (
                  <tr
                    key={person.membershipId}
                    className="border-b-4 border-fill max-sm:block max-sm:py-2"
                  >
                    <th scope="row" className="py-2 pr-4 max-sm:block max-sm:py-0">
                      {person.name}
                    </th>
                    <td className="pr-4 text-text-quiet max-sm:block">{person.email}</td>
                    <td className="pr-4 max-sm:inline">{person.roles.join(', ')}</td>
                    <td className="text-text-quiet max-sm:inline">
                      {person.deactivated ? 'deactivated' : (person.group ?? '')}
                    </td>
                  </tr>
                ))}
              </tbody>
            </table>
          </section>
          <section>
            <h2 className="border-b-4 border-line pb-1 text-3xl">Last four weeks</h2>
            {classes.length === 0 ? (
              <p className="py-4">No class has been held yet.</p>
            ) : (
              <ul>
                {classes.map((one) => {
                  const count = counts.get(one.scheduledClassId)
                  return (
                    <li
                      key={one.scheduledClassId}
                      className="flex flex-wrap justify-between gap-x-6 border-b-4 border-fill py-2"
                    >
                      <span>
                        <strong>{one.title}</strong>{' '}
                        <span className="text-text-quiet">{dayName(one.day)}</span>
                      </span>
                      <span className="tabular-nums">
                        {count ? `${count.finished} of ${count.started} finished` : 'nobody'}
                      </span>
                    </li>
                  )
                })}
              </ul>
            )}
            <p className="mt-3 text-base text-text-quiet">
              What members answered, rated and felt is health data: their coaches see it, an owner
              does not.
            </p>
          </section>
        </div>
      </div>
    </PageFrame>
  )
}

function Fact({ term, value }: { term: string; value: string }) {
  return (
    <div>
      <dt className="text-base text-text-quiet">{term}</dt>
      <dd className="font-display text-2xl font-bold">{value}</dd>
    </div>
  )
}
