/** The browser's speech synthesis: which voices there are, and saying one text at a time. */
import type { VoicePort, VoiceSettings } from './ports'
import type { VoiceChoice } from './types'

/** `null` where the browser has no speech at all. */
function synthesis(): SpeechSynthesis | null {
  return typeof window !== 'undefined' && 'speechSynthesis' in window
    ? window.speechSynthesis
    : null
}

/** Voices of the page's language first, those that need no network before the others. */
function choicesOf(voices: readonly SpeechSynthesisVoice[], language: string): VoiceChoice[] {
  const isOwn = (tag: string) => tag.slice(0, 2).toLowerCase() === language.slice(0, 2)
  const rank = (voice: SpeechSynthesisVoice) =>
    (isOwn(voice.lang) ? 0 : 4) + (voice.localService ? 0 : 2) + (voice.default ? 0 : 1)
  return [...voices]
    .sort((one, other) => rank(one) - rank(other) || one.name.localeCompare(other.name))
    .map((voice) => ({ id: voice.voiceURI, name: voice.name, language: voice.lang }))
}

/** The browser's voice. One a page: the synthesis is the page's. */
export function browserVoice(): VoicePort {
  const speech = synthesis()
  let settings: VoiceSettings = { on: true, voice: null, rate: 1, volume: 1 }
  let choices: VoiceChoice[] = []
  let isClosed = false
  /** The one being said: kept here, since some browsers drop an utterance that nothing holds. */
  let current: SpeechSynthesisUtterance | null = null
  const watchers = new Set<(voices: VoiceChoice[]) => void>()

  const read = () => {
    choices = choicesOf(speech?.getVoices() ?? [], document.documentElement.lang || 'en')
    watchers.forEach((watcher) => watcher(choices))
  }
  read()
  speech?.addEventListener('voiceschanged', read)

  function hush(): void {
    current = null
    speech?.cancel()
  }

  return {
    watch(watcher) {
      watchers.add(watcher)
      watcher(choices)
      return () => watchers.delete(watcher)
    },
    configure(next) {
      settings = next
      if (!next.on || next.volume === 0) hush()
    },
    say(text, level, done) {
      if (!speech || isClosed || !settings.on || settings.volume === 0) return null
      const voices = speech.getVoices()
      const voice =
        voices.find((one) => one.voiceURI === settings.voice) ??
        voices.find((one) => one.voiceURI === choices[0]?.id)
      if (!voice) return null
      const utterance = new SpeechSynthesisUtterance(text)
      utterance.voice = voice
      utterance.lang = voice.lang
      utterance.rate = settings.rate
      utterance.volume = settings.volume * level
      const ended = () => {
        if (current !== utterance) return
        current = null
        done()
      }
      utterance.addEventListener('end', ended)
      utterance.addEventListener('error', ended)
      // A queue that another page left standing would hold this back for ever.
      speech.cancel()
      speech.resume()
      current = utterance
      speech.speak(utterance)
      return () => {
        if (current === utterance) hush()
      }
    },
    close() {
      isClosed = true
      watchers.clear()
      hush()
      speech?.removeEventListener('voiceschanged', read)
    },
  }
}
