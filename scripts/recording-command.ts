/**
 * The beeps and calls of one block as a sound file, made without a browser: what a coach hears in class,
 * to listen to or to lay under a video. `recording.ts` runs it; apart, so that tests can call it.
 */
import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import { parseSpecOrVersion } from '@/server/engine/spec/problems'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { compile } from '@/server/engine/timeline/compile'
import { SOUND_NAMES, soundsOf, type SoundName } from '@/server/engine/timeline/mark-sound'
import { readWav, wavOf } from './lib/wav.mjs'
import { mixed } from './mix'

export interface RecordedSound {
  /** Milliseconds from the start of the recording, which is the block's own start. */
  atMs: number
  sound: SoundName
}

/** The sounds of a block, its count-in among them, from the start of its first segment. */
export function soundsOfBlock(version: PublishedVersion, block: string): RecordedSound[] {
  const timeline = compile(version)
  const own = timeline.segments.filter((segment) => segment.block === block)
  const startMs = own[0]?.startMs ?? 0
  const endMs = own.at(-1)?.endMs ?? 0
  const sounds = soundsOf(timeline)
    .filter(({ atMs, mark }) =>
      // What ends the block before sounds at this one's beginning: it belongs here where it starts work.
      atMs === startMs
        ? mark.what === 'beep' && mark.sound === 'start'
        : atMs > startMs && atMs <= endMs,
    )
    .map(({ atMs, name }) => ({ atMs: atMs - startMs, sound: name }))
  // Work that a brief, or the start of the class, leads straight into is begun by the player's own bell.
  const first = own.find((segment) => segment.kind !== 'brief')
  const isUnannounced = first?.kind === 'work' && !sounds.some((one) => one.atMs === 0)
  return isUnannounced ? [{ atMs: 0, sound: 'bell' }, ...sounds] : sounds
}

/** The recording of `sounds` as a WAV file. `folder`: where the player's sounds lie. */
export function recordingOf(sounds: readonly RecordedSound[], folder: string): Buffer {
  const files = new Map(
    SOUND_NAMES.map((name) => [name, readWav(readFileSync(join(folder, `${name}.wav`)))] as const),
  )
  const rate = files.get('knock')?.rate ?? 48_000
  const placed = sounds.map(({ atMs, sound }) => ({
    atMs,
    samples: files.get(sound)?.samples ?? new Float64Array(0),
  }))
  return wavOf(mixed(placed, rate), rate)
}

const USAGE = 'Use: npm run recording -- FILE --block ID --out FILE.wav'

/** Runs the command; what it prints and ends with: 0, 1 for a class with problems, 2 for a wrong call. */
export function recordingCommand(args: string[]): { code: 0 | 1 | 2; text: string } {
  let call: { values: { block?: string; out?: string }; positionals: string[] }
  try {
    call = parseArgs({
      args,
      allowPositionals: true,
      options: { block: { type: 'string' }, out: { type: 'string' } },
    })
  } catch (error) {
    return { code: 2, text: `${error instanceof Error ? error.message : ''} ${USAGE}` }
  }
  const { block, out } = call.values
  const [file] = call.positionals
  if (!file || !block || !out || call.positionals.length > 1) return { code: 2, text: USAGE }
  let json: unknown
  try {
    json = JSON.parse(readFileSync(file, 'utf8'))
  } catch {
    return { code: 2, text: `${file} cannot be read as JSON.` }
  }
  const { version, problems } = parseSpecOrVersion(json)
  if (problems) return { code: 1, text: JSON.stringify(problems, null, 2) }
  if (!version.spec.blocks.some((one) => one.id === block)) {
    return { code: 2, text: `The class has no block ${block}.` }
  }
  const sounds = soundsOfBlock(version, block)
  try {
    writeFileSync(out, recordingOf(sounds, 'public/sounds'))
  } catch {
    return { code: 2, text: `${out} cannot be written.` }
  }
  return { code: 0, text: JSON.stringify(sounds, null, 2) }
}
