// @vitest-environment jsdom
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import type { VoiceSettings } from '@/hooks/player/ports'
import { browserVoice } from '@/hooks/player/voice'

const VOICES = [
  { voiceURI: 'far', name: 'Far', lang: 'en-GB', localService: false, default: false },
  { voiceURI: 'svea', name: 'Svea', lang: 'sv-SE', localService: true, default: true },
  { voiceURI: 'near', name: 'Near', lang: 'en-GB', localService: true, default: false },
]
const settings: VoiceSettings = { on: true, voice: null, rate: 1.2, volume: 0.8 }

class FakeUtterance extends EventTarget {
  voice: { voiceURI: string } | null = null
  lang = ''
  rate = 1
  volume = 1
  constructor(readonly text: string) {
    super()
  }
}

class FakeSpeech extends EventTarget {
  voices: object[] = []
  spoken: FakeUtterance[] = []
  getVoices() {
    return this.voices
  }
  speak(utterance: FakeUtterance) {
    this.spoken.push(utterance)
  }
  /** As browsers do it: what was being said ends with an error. */
  cancel() {
    this.spoken.at(-1)?.dispatchEvent(new Event('error'))
  }
  resume() {}
}

let speech: FakeSpeech
beforeEach(() => {
  speech = new FakeSpeech()
  Object.defineProperty(window, 'speechSynthesis', { value: speech, configurable: true })
  vi.stubGlobal('SpeechSynthesisUtterance', FakeUtterance)
})
afterEach(() => {
  vi.unstubAllGlobals()
  Reflect.deleteProperty(window, 'speechSynthesis')
})

describe('the browser’s voice', () => {
  it('tells its voices now and as they come: the page’s language first, those without a network before', () => {
    const told: string[][] = []
    const voice = browserVoice()
    voice.watch((voices) => told.push(voices.map((one) => one.name)))
    speech.voices = VOICES
    speech.dispatchEvent(new Event('voiceschanged'))
    expect(told).toEqual([[], ['Near', 'Far', 'Svea']])
  })

  it('says a text in the chosen voice, at its speed and volume, and tells when it has done', () => {
    speech.voices = VOICES
    const voice = browserVoice()
    voice.configure({ ...settings, voice: 'svea' })
    const done = vi.fn()
    expect(voice.say('Half-way', 0.5, done)).not.toBeNull()
    const [one] = speech.spoken
    expect(one).toMatchObject({ text: 'Half-way', lang: 'sv-SE', rate: 1.2, volume: 0.4 })
    one?.dispatchEvent(new Event('end'))
    expect(done).toHaveBeenCalledTimes(1)
  })

  it('takes the first voice where the chosen one is gone', () => {
    speech.voices = VOICES
    const voice = browserVoice()
    voice.configure({ ...settings, voice: 'another-computer' })
    voice.say('Rest', 1, () => undefined)
    expect(speech.spoken[0]?.voice?.voiceURI).toBe('near')
  })

  it('a text that is cut does not count as said', () => {
    speech.voices = VOICES
    const voice = browserVoice()
    voice.configure(settings)
    const done = vi.fn()
    voice.say('A long cue', 1, done)?.()
    expect(done).not.toHaveBeenCalled()
  })

  it('says nothing while it is off, without voices, closed, or where there is no speech at all', () => {
    const say = (voice: ReturnType<typeof browserVoice>) => voice.say('Rest', 1, () => undefined)
    expect(say(browserVoice())).toBeNull()
    speech.voices = VOICES
    const off = browserVoice()
    off.configure({ ...settings, on: false })
    expect(say(off)).toBeNull()
    const closed = browserVoice()
    closed.close()
    expect(say(closed)).toBeNull()
    Reflect.deleteProperty(window, 'speechSynthesis')
    expect(say(browserVoice())).toBeNull()
  })
})
