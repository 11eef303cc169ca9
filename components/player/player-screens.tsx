'use client'
import { useDistanceText } from '@/hooks/player/use-distance-text'
import { AfterClass } from './after-class'
import { useArrowFocus } from './arrow-focus'
import { BeforeClass } from './before-class'
import { InClass } from './in-class'
import { GapQuestion, OtherTab, PlayerLoading, ResumeOffer } from './offers'
import { usePlayer } from './player-context'
import { TV_INCHES } from './player-frame'

/** The screen of the store's stage. */
export function PlayerScreens({ timeZone }: { timeZone: string }) {
  const stage = usePlayer((state) => state.stage)
  const otherTab = usePlayer((state) => state.otherTab)
  const inches = usePlayer((state) => state.preferences.screenDiagonalInches)
  const metres = usePlayer((state) => state.preferences.distanceMetres)
  useDistanceText(inches, metres)
  // Elsewhere than in class, arrows without a focus scroll the page, save on a television.
  useArrowFocus(stage === 'class' || inches >= TV_INCHES)
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
