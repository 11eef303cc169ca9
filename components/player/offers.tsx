'use client'
import type { ReactNode } from 'react'
import { paths } from '@/server/contract/paths'
import { ActionButton } from './button'
import { usePlayer } from './player-context'
import { lengthText } from './texts'

/** One question on the floor, two ways on. */
function Offer({ title, children, ways }: { title: string; children: ReactNode; ways: ReactNode }) {
  return (
    <main className="grid min-h-dvh content-center boards text-[clamp(18px,2.4vh,30px)]">
      <div className="mx-auto w-full max-w-[60em] border-l-[10px] border-present px-[clamp(16px,4vw,64px)] py-6">
        <h1 className="text-[clamp(40px,9vh,110px)] text-balance">{title}</h1>
        <div className="mt-4 grid max-w-[34em] gap-3">{children}</div>
        <div className="mt-8 flex flex-wrap gap-4 text-[1.25em]">{ways}</div>
      </div>
    </main>
  )
}

export function ResumeOffer() {
  const title = usePlayer((state) => state.data.version.spec.title)
  const tally = usePlayer((state) => state.tally)
  const resume = usePlayer((state) => state.resumeOpenAttempt)
  const discard = usePlayer((state) => state.discardOpenAttempt)
  const rounds = tally?.blocks.reduce((sum, block) => sum + block.rounds, 0) ?? 0
  return (
    <Offer
      title="Go on with your class?"
      ways={
        <>
          <ActionButton look="primary" autoFocus onClick={resume}>
            Go on
          </ActionButton>
          <ActionButton onClick={discard}>Start anew</ActionButton>
        </>
      }
    >
      <p>
        You were in {title}
        {tally && tally.classMs > 0 ? `, ${lengthText(tally.classMs)} in` : ''}
        {rounds > 0 ? `, with ${rounds} ${rounds === 1 ? 'round' : 'rounds'} logged` : ''}. All of
        it is kept, whatever you choose.
      </p>
    </Offer>
  )
}

export function GapQuestion() {
  const gap = usePlayer((state) => state.gap)
  const goOn = usePlayer((state) => state.goOn)
  return (
    <Offer
      title={gap?.reason === 'clock-changed' ? 'The clock has jumped' : 'You were away'}
      ways={
        <>
          <ActionButton look="primary" autoFocus onClick={() => goOn('where-i-was')}>
            From where I was
          </ActionButton>
          <ActionButton onClick={() => goOn('where-the-clock-would-be')}>
            From where the clock would be
          </ActionButton>
        </>
      }
    >
      <p>
        {gap?.reason === 'clock-changed'
          ? 'This computer slept, or its clock was set during your class: how long you were away is not certain. Your rounds are all there.'
          : `The class has stood still for ${lengthText(gap?.awayMs ?? 0)}. Your rounds are all there.`}
      </p>
      <p>Where do you want to go on?</p>
    </Offer>
  )
}

export function OtherTab() {
  const takeOver = usePlayer((state) => state.takeOver)
  return (
    <Offer
      title="This class runs in another tab"
      ways={
        <>
          <ActionButton look="primary" autoFocus onClick={takeOver}>
            Take over here
          </ActionButton>
          <a
            href={paths.today()}
            className="inline-flex min-h-12 items-center condensed underline underline-offset-4"
          >
            Back to today
          </a>
        </>
      }
    >
      <p>
        Only one tab can lead it, or rounds would be counted twice. If you take over, the other one
        stands still; what is logged there is here as well.
      </p>
    </Offer>
  )
}

/** The floor plan's own lines while the browser's store answers. */
export function PlayerLoading() {
  return (
    <main className="grid min-h-dvh grid-cols-[40%_1fr] boards" aria-busy="true">
      <p className="sr-only" role="status">
        Getting your class ready
      </p>
      <div className="p-[4vw]">
        <div className="h-[26vh] w-4/5 bg-fill" />
        <div className="mt-6 h-[12vh] w-1/2 bg-fill" />
      </div>
      <div className="border-l-8 border-(--line) p-[4vw]">
        <div className="h-[10vh] w-3/5 bg-fill" />
      </div>
    </main>
  )
}
