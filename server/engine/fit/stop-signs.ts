/** Signs that mean stop exercising, in our own words, and what to do then. Never a diagnosis. */
import type { RedFlagSign, StopSign } from '../tally/events'
import { RED_FLAG_SIGNS } from '../tally/names'

/** As the member reads them under 'What is it?'. */
export const STOP_SIGN_TEXT: Readonly<Record<StopSign, string>> = {
  'chest-pain': 'Pain, pressure or tightness in the chest',
  breathless: 'Far more out of breath than the work explains, or wheezing',
  'dizzy-or-faint': 'Dizzy, faint, confused or unsteady; pale, cold and clammy, or sick',
  'irregular-heartbeat': 'A heartbeat that stumbles, or races for no reason',
  'calf-or-leg-cramp': 'Cramp or pain in a calf or leg that makes me stop',
  'severe-tiredness': 'A tiredness that is quite unlike me',
  pain: 'Something hurts',
  'want-to-stop': 'I want to stop',
  other: 'Something else',
}

/** The list that 'Stop' shows at once. */
export const RED_FLAG_TEXT: readonly { sign: RedFlagSign; text: string }[] = RED_FLAG_SIGNS.map(
  (sign) => ({ sign, text: STOP_SIGN_TEXT[sign] }),
)

export const STOP_ADVICE =
  'With any of these, stop for today. Sit or lie down and let somebody know. If pain in the chest, fainting or trouble breathing stays, call for help.'

export const AFTER_RED_FLAG =
  'Going on is not offered in this class. Your coach sees it. Have a licensed professional look at it before you train again.'

/** Shown as a number where the gym has set one, else in words. */
export function emergencyText(emergencyNumber: string | null): string {
  return emergencyNumber?.trim() || 'your local emergency number'
}

/** True for a sign after which going on is not offered in that class. */
export function isRedFlag(sign: string | null | undefined): boolean {
  return RED_FLAG_SIGNS.some((one) => one === sign)
}
