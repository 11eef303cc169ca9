'use client'
import { useDistanceText } from '@/hooks/player/use-distance-text'
import { AfterClass } from './after-class'
import { BeforeClass } from './before-class'
import { InClass } from './in-class'
import { GapQuestion, OtherTab, PlayerLoading, ResumeOffer } from './offers'
import { usePlayer } from './player-context'

/** The screen of the store's stage. */
export function PlayerScreens({ timeZone }: { timeZone: string }) {
  const stage = usePlayer((state) => state.stage)
  const otherTab = usePlayer((state) => state.otherTab)
  const inches = usePlayer((state) => state.preferences.screenDiagonalInches)
  const metres = usePlayer((state) => state.preferences.distanceMetres)
  useDistanceText(inches, metres)
  if (otherTab) return <OtherTab />
  switch (stage) {
    case 'loading':
      return <PlayerLoading />
    case 'before':
      return <BeforeClass timeZone={timeZone} />
    case 'resume':
      return <ResumeOffer />
    case 'gap':
      return <GapQuestion />
    case 'class':
      return <InClass />
    case 'after':
      return <AfterClass />
  }
}
