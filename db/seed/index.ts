/**
 * The demo gym: Quayside Hall in Port Ellery. Everything in it is invented. Four weeks of classes and
 * results lie behind `now`, a class is open today with members in it, more are scheduled ahead.
 */
import { TZDate } from '@date-fns/tz'
import { addDays, format, getISODay, startOfDay } from 'date-fns'
import type { PgDatabase, PgQueryResultHKT } from 'drizzle-orm/pg-core'
import { v7 } from 'uuid'
import { HEALTH_QUESTIONS, type HealthAnswers } from '@/server/engine/fit/screening'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { SessionSpec } from '@/server/engine/spec/schema'
import type { ClassEvent } from '@/server/engine/tally/events'
import { fold } from '@/server/engine/tally/fold'
import { attemptEvents } from '../schema/attempt-events'
import { attempts } from '../schema/attempts'
import { auditEntries } from '../schema/audit-entries'
import { classVersions } from '../schema/class-versions'
import { gyms } from '../schema/gyms'
import { healthAnswers } from '../schema/health-answers'
import { hurtHolds } from '../schema/hurt-holds'
import { memberships } from '../schema/memberships'
import { movements } from '../schema/movements'
import { BODY_NOTES, type BodyNote } from '@/server/contract/fit'
import { people } from '../schema/people'
import { scheduledClasses } from '../schema/scheduled-classes'
import { demoClasses, type DemoClass } from './classes'
import { demoMovements } from './movements'
import { DEMO_PASSWORD, demoMembers, demoStaff, type DemoMember } from './people'
import { seededRandom, type Random } from './random'
import { simulateAttempt, type Simulation } from './simulate'

type Database = PgDatabase<PgQueryResultHKT, Record<string, unknown>>

export const DEMO_GYM = {
  name: 'Quayside Hall',
  place: 'Port Ellery',
  timeZone: 'Europe/Oslo',
} as const

const WEEKS_BEHIND = 4
const WEEKS_AHEAD = 3
const MINUTE_MS = 60_000
const DAY_MS = 86_400_000

/** The week's plan by ISO weekday; the short class is there every day. */
const WEEK: Partial<Record<number, DemoClass>> = {
  1: 'slipway',
  2: 'anchorWatch',
  3: 'harbourLights',
  5: 'lowWater',
  6: 'anchorWatch',
}
/** Whatever the weekday, today has the class that shows most. */
const TODAY: DemoClass = 'slipway'

/** How members stand in today's class right after seeding: minutes since they began, or what they did. */
const TODAY_IN_CLASS: Record<string, number> = {
  'Bilal Haddad': 19,
  'Carmen Oyelaran': 17.5,
  'Farid Benali': 16,
  'Hyun-woo Park': 21,
  'Inés Castellanos-Villaverde': 18,
  'Kemi Adebayo': 14,
  'Liam O’Rourke': 9,
  'Pavel Horvat': 24,
  'Tove Bergqvist': 11.5,
}
const TODAY_FINISHED = ['Nadia Ferrante', 'Samir Choudhury', 'Wren Calloway']
const TODAY_STOPPED = 'Odile Marchetti'

export interface SeedOptions {
  now: Date
  hashPassword: (password: string) => Promise<string>
}

interface SeededMember {
  member: DemoMember
  membershipId: string
}

/** Puts the demo gym into an empty database. Resolves with what was made. */
export async function seedDemoGym(
  db: Database,
  { now, hashPassword }: SeedOptions,
): Promise<{ people: number; classes: number; attempts: number; events: number }> {
  const random = seededRandom(20_261)
  const newId = (at: Date) => v7({ msecs: at.getTime(), random: random.bytes(16) })
  const founded = new Date(now.getTime() - 200 * DAY_MS)
  const gymId = newId(founded)
  const passwordHash = await hashPassword(DEMO_PASSWORD)

  return db.transaction(async (tx) => {
    await tx.insert(gyms).values({ id: gymId, ...DEMO_GYM, createdAt: founded })

    const coachIds: string[] = []
    const seeded: SeededMember[] = []
    for (const staff of demoStaff) {
      const personId = newId(founded)
      await tx.insert(people).values({
        id: personId,
        email: staff.email,
        name: staff.name,
        passwordHash,
        createdAt: founded,
      })
      await tx.insert(memberships).values({
        id: newId(founded),
        gymId,
        personId,
        roles: staff.roles,
        kit: staff.roles.includes('member') ? { dumbbell: 2, mat: 1, chair: 1 } : {},
        group: staff.roles.includes('member') ? 'Evening group' : null,
        createdAt: founded,
      })
      if (staff.roles.includes('coach')) coachIds.push(personId)
    }
    for (const member of demoMembers) {
      const joined = new Date(now.getTime() - random.between(70, 190) * DAY_MS)
      const personId = newId(joined)
      const membershipId = newId(joined)
      await tx.insert(people).values({
        id: personId,
        email: member.email,
        name: member.name,
        passwordHash,
        createdAt: joined,
      })
      await tx.insert(memberships).values({
        id: membershipId,
        gymId,
        personId,
        roles: ['member'],
        group: member.group,
        kit: member.kit,
        bodyNotes: notesOf(member),
        wantsMore: member.wantsMore ?? false,
        createdAt: joined,
      })
      await insertHealth(tx, member, membershipId, now, random)
      seeded.push({ member, membershipId })
    }

    await tx.insert(movements).values(
      demoMovements.map((content) => ({
        id: newId(founded),
        gymId,
        slug: content.slug,
        content,
        builtIn: true,
        createdAt: founded,
      })),
    )

    const versions = new Map<DemoClass, { versionId: string; version: PublishedVersion }>()
    const published = new Date(now.getTime() - (WEEKS_BEHIND * 7 + 2) * DAY_MS)
    for (const name of Object.keys(demoClasses) as DemoClass[]) {
      const version = frozen(demoClasses[name])
      const versionId = newId(published)
      versions.set(name, { versionId, version })
      const coachId = coachIds[versions.size % coachIds.length] ?? null
      await tx.insert(classVersions).values({
        id: versionId,
        gymId,
        classId: newId(published),
        content: version,
        publishedBy: coachId,
        createdAt: published,
      })
      await tx.insert(auditEntries).values({
        id: newId(published),
        gymId,
        personId: coachId,
        action: 'class.published',
        subject: versionId,
        createdAt: published,
      })
    }

    const today = startOfDay(new TZDate(now, DEMO_GYM.timeZone))
    const results: {
      attempts: (typeof attempts.$inferInsert)[]
      events: (typeof attemptEvents.$inferInsert)[]
      holds: (typeof hurtHolds.$inferInsert)[]
    } = { attempts: [], events: [], holds: [] }
    let classes = 0
    for (let offset = -7 * WEEKS_BEHIND; offset <= 7 * WEEKS_AHEAD; offset += 1) {
      const day = addDays(today, offset)
      const planned = offset === 0 ? TODAY : WEEK[getISODay(day)]
      for (const name of planned ? [planned, 'breakwater' as const] : ['breakwater' as const]) {
        const published = versions.get(name)
        if (!published) continue
        // Ids order what opens at once: the day's own class comes before the short one.
        const scheduledClassId = newId(new Date(day.getTime() + (name === planned ? 0 : 1)))
        await tx.insert(scheduledClasses).values({
          id: scheduledClassId,
          gymId,
          versionId: published.versionId,
          day: format(day, 'yyyy-MM-dd'),
          opensAt: new Date(day.getTime()),
          closesAt: new Date(addDays(day, 1).getTime()),
          group: null,
          coachId: coachIds[(offset + 700) % coachIds.length] ?? null,
          createdAt: published ? new Date(now.getTime() - (WEEKS_BEHIND * 7 + 1) * DAY_MS) : now,
        })
        classes += 1
        const runs =
          offset < 0
            ? pastRuns(seeded, name, day, random)
            : offset === 0 && name === TODAY
              ? todaysRuns(seeded, now)
              : []
        for (const run of runs) {
          const attemptId = newId(run.startedAt)
          const events = simulateAttempt({ ...published, ...run, random })
          const last = events.at(-1)
          if (!last) continue
          const finished = events.findLast((event) => event.type === 'finished')
          results.attempts.push({
            id: attemptId,
            gymId,
            membershipId: run.membershipId,
            scheduledClassId,
            versionId: published.versionId,
            late: false,
            startedAt: run.startedAt,
            finishedAt: finished ? new Date(finished.wallMs) : null,
            lastEventAt: new Date(last.wallMs),
            revision: events.length,
            state: fold(published.version, events).state,
            stateSeq: last.seq,
            createdAt: run.startedAt,
          })
          for (const event of events) {
            results.events.push({
              attemptId,
              id: event.id,
              seq: event.seq,
              content: event,
              receivedAt: new Date(event.wallMs + 400),
            })
            if (event.type === 'hurt')
              results.holds.push(holdOf(event, run.membershipId, attemptId, offset))
          }
        }
      }
    }
    for (const part of chunks(results.attempts, 500)) await tx.insert(attempts).values(part)
    for (const part of chunks(results.events, 2_000)) await tx.insert(attemptEvents).values(part)
    for (const part of chunks(results.holds, 500)) await tx.insert(hurtHolds).values(part)
    return {
      people: demoStaff.length + demoMembers.length,
      classes,
      attempts: results.attempts.length,
      events: results.events.length,
    }
  })
}

/** The class with a copy of every movement that it uses. */
function frozen(spec: SessionSpec): PublishedVersion {
  const used = new Set(
    spec.blocks.flatMap((block) =>
      block.format.type === 'rest' ? [] : block.format.stations.map((station) => station.movement),
    ),
  )
  return { spec, movements: demoMovements.filter((movement) => used.has(movement.slug)) }
}

async function insertHealth(
  tx: Database,
  member: DemoMember,
  membershipId: string,
  now: Date,
  random: Random,
): Promise<void> {
  if (member.neverAsked) return
  const answered = new Date(now.getTime() - random.between(12, 60) * DAY_MS)
  const answers = Object.fromEntries(
    HEALTH_QUESTIONS.map((question) => [question, member.yes?.includes(question) ?? false]),
  ) as HealthAnswers
  await tx.insert(healthAnswers).values({
    id: v7({ msecs: answered.getTime(), random: random.bytes(16) }),
    membershipId,
    answers,
    clearedAt: member.cleared ? answered : null,
    limits: member.limits ?? [],
    createdAt: answered,
  })
}

type Run = Pick<Simulation, 'member' | 'startedAt' | 'untilMs' | 'incident'> & {
  membershipId: string
}

/** Who did a class of the past weeks, and when that day. */
function pastRuns(seeded: SeededMember[], name: DemoClass, day: Date, random: Random): Run[] {
  const share = name === 'breakwater' ? 0.12 : 0.8
  return seeded
    .filter(({ member }) => member.attendance > 0 && random.chance(member.attendance * share))
    .map(({ member, membershipId }) => {
      const hour =
        member.group === 'Morning group' ? random.between(6.5, 8.5) : random.between(17.5, 20)
      const incident: Simulation['incident'] = random.chance(0.015)
        ? {
            atClassMs: random.between(4, 15) * MINUTE_MS,
            stop: 'want-to-stop',
            note: 'Doorbell, then no time',
          }
        : random.chance(0.02)
          ? {
              atClassMs: random.between(5, 16) * MINUTE_MS,
              hurt: member.takes.includes('shoulder') ? 'shoulder' : 'knee',
            }
          : undefined
      return {
        member,
        membershipId,
        startedAt: new Date(day.getTime() + hour * 60 * MINUTE_MS),
        untilMs: null,
        ...(incident ? { incident } : {}),
      }
    })
}

/** Today's class: some in it, some done, one stopped, the others not here yet. */
function todaysRuns(seeded: SeededMember[], now: Date): Run[] {
  return seeded.flatMap(({ member, membershipId }): Run[] => {
    const inClass = TODAY_IN_CLASS[member.name]
    const began = (minutes: number) => new Date(now.getTime() - minutes * MINUTE_MS)
    if (inClass !== undefined) {
      const hurts = member.takes.includes('shoulder')
      return [
        {
          member,
          membershipId,
          startedAt: began(inClass),
          untilMs: inClass * MINUTE_MS,
          ...(hurts
            ? {
                incident: {
                  atClassMs: 14 * MINUTE_MS,
                  hurt: 'shoulder' as const,
                  note: 'Left, when rowing',
                },
              }
            : {}),
        },
      ]
    }
    if (TODAY_FINISHED.includes(member.name)) {
      return [{ member, membershipId, startedAt: began(95 + member.pace * 20), untilMs: null }]
    }
    if (member.name === TODAY_STOPPED) {
      return [
        {
          member,
          membershipId,
          startedAt: began(26),
          untilMs: null,
          incident: {
            atClassMs: 14.5 * MINUTE_MS,
            stop: 'dizzy-or-faint',
            note: 'Dizzy on standing up, sitting down now',
          },
        },
      ]
    }
    return []
  })
}

/** Old holds are cleared by both; one from today is still open. */
function holdOf(
  event: Extract<ClassEvent, { type: 'hurt' }>,
  membershipId: string,
  attemptId: string,
  dayOffset: number,
): typeof hurtHolds.$inferInsert {
  const raised = new Date(event.wallMs)
  const cleared = dayOffset < -9 ? new Date(raised.getTime() + 2 * DAY_MS) : null
  return {
    id: event.id,
    membershipId,
    attemptId,
    place: event.where,
    memberClearedAt: cleared,
    coachClearedAt: cleared,
    createdAt: raised,
  }
}

function chunks<T>(items: readonly T[], size: number): T[][] {
  const parts: T[][] = []
  for (let from = 0; from < items.length; from += size) parts.push(items.slice(from, from + size))
  return parts
}

/** What a member would note of their own body; what comes with a pregnancy is a word with the coach. */
function notesOf({ takes, yes }: DemoMember): BodyNote[] {
  if (yes?.includes('pregnant-or-recent-birth')) return []
  return BODY_NOTES.filter((note) => takes.includes(note))
}
