import type { Metadata } from 'next'
import { addDays, format } from 'date-fns'
import type { ReactNode } from 'react'
import { ParticipationLine } from '@/components/account/participation-line'
import { PageFrame } from '@/components/site/page-frame'
import { Empty } from '@/components/ui/empty'
import { PageTitle, Part } from '@/components/ui/heading'
import { requireRole } from '@/server/auth/viewer'
import { plural, shortDay } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { participation } from '@/server/data/boards'
import { listBetween, localDay } from '@/server/data/classes'
import { defaultDb } from '@/server/data/db'
import { getGymOverview } from '@/server/data/people'
import { readerDateStyle } from '@/server/http/reader'

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
  const dateStyle = await readerDateStyle()
  return (
    <PageFrame viewer={viewer}>
      <div className="page">
        <PageTitle>{gym.name}</PageTitle>
        <p className="mt-3 text-text-quiet">{gym.place}</p>
        <dl className="mt-7 flex flex-wrap gap-x-12 gap-y-5">
          <Fact term="Members">{members.length}</Fact>
          <Fact term="Time zone">{gym.timeZone}</Fact>
          <Fact term="Health questions again after">{plural(gym.healthIntervalDays, 'day')}</Fact>
          <Fact term="Emergency number">
            {gym.emergencyNumber ?? (
              <>
                not set
                <span className="block font-text text-base font-normal tracking-normal text-text-quiet">
                  members read ‘your local emergency number’
                </span>
              </>
            )}
          </Fact>
        </dl>
        <div className="mt-12 grid gap-x-14 gap-y-12 xl:grid-cols-[3fr_2fr]">
          <Part title="People" beside={<p>{gym.people.length} in all</p>}>
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
                    className="border-b-4 border-fill align-baseline max-sm:block max-sm:py-2"
                  >
                    <th scope="row" className="py-2.5 pr-5 max-sm:block max-sm:py-0">
                      {person.name}
                    </th>
                    <td className="pr-5 break-words text-text-quiet max-sm:block">
                      {person.email}
                    </td>
                    <td className="pr-5 whitespace-nowrap max-sm:inline">
                      {person.roles.join(', ')}
                    </td>
                    <td className="text-text-quiet max-sm:inline sm:text-right sm:whitespace-nowrap">
                      {person.deactivated ? <strong>deactivated</strong> : (person.group ?? '')}
                    </td>
                  </tr>
                ))}
              </tbody>
            </table>
          </Part>
          <Part title="Last four weeks" beside={<p>finished of started</p>}>
            {classes.length === 0 ? (
              <Empty>
                <p>No class has been held yet.</p>
              </Empty>
            ) : (
              <ul>
                {classes.map((one) => {
                  const count = counts.get(one.scheduledClassId)
                  return (
                    <li
                      key={one.scheduledClassId}
                      className="grid grid-cols-[6rem_1fr_auto] items-baseline gap-x-4 border-b-4 border-fill py-2.5 sm:grid-cols-[6rem_9rem_1fr_6rem]"
                    >
                      <span className="text-text-quiet">{shortDay(one.day, dateStyle)}</span>
                      <strong>{one.title}</strong>
                      <div className="max-sm:hidden">
                        {count ? (
                          <ParticipationLine
                            started={count.started}
                            finished={count.finished}
                            members={members.length}
                          />
                        ) : null}
                      </div>
                      <span className="text-right tabular-nums">
                        {count ? `${count.finished} of ${count.started}` : 'nobody'}
                      </span>
                    </li>
                  )
                })}
              </ul>
            )}
            <p className="mt-4 text-text-quiet">
              What members answered, rated and felt is health data: their coaches see it, an owner
              does not.
            </p>
          </Part>
        </div>
      </div>
    </PageFrame>
  )
}

function Fact({ term, children }: { term: string; children: ReactNode }) {
  return (
    <div>
      <dt className="text-text-quiet">{term}</dt>
      <dd className="font-display text-2xl font-bold">{children}</dd>
    </div>
  )
}
