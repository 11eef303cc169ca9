import type { ReactNode } from 'react'

/** A thing that a class asks for, drawn like what a figure holds; a plain bay where it has no drawing. */
export function KitPicture({ item, count }: { item: string; count: number }) {
  return (
    <svg
      viewBox="0 0 60 48"
      aria-hidden
      focusable="false"
      className="h-12 w-15 shrink-0"
      fill="none"
      strokeLinecap="round"
    >
      {item === 'dumbbell' && count > 1 ? (
        <>
          <Dumbbell at="translate(-2 -9)" />
          <Dumbbell at="translate(8 9)" />
        </>
      ) : (
        (DRAWINGS[item] ?? PLAIN)
      )}
    </svg>
  )
}

function Dumbbell({ at }: { at: string }) {
  return (
    <g
      transform={at}
      className="fill-kit stroke-ground"
      strokeWidth="3"
      style={{ paintOrder: 'stroke' }}
    >
      <path d="M15 20h24v8H15zM6 13h11v22H6zM37 13h11v22H37z" />
    </g>
  )
}

const PLAIN = <path d="M12 10h36v30H12z" className="stroke-line" strokeWidth="4" />

const DRAWINGS: Record<string, ReactNode> = {
  dumbbell: <Dumbbell at="translate(3 0)" />,
  kettlebell: (
    <>
      <path d="M21 24c-4-18 22-18 18 0" className="stroke-kit" strokeWidth="5" />
      <circle cx="30" cy="32" r="13" className="fill-kit" />
    </>
  ),
  band: (
    <path
      d="M14 24c0-11 32-11 32 0s-32 11-32 0z"
      className="stroke-kit"
      strokeWidth="5"
      transform="rotate(-18 30 24)"
    />
  ),
  mat: <path d="M4 41h40a10 10 0 1 0-10-10" className="stroke-line" strokeWidth="6" />,
  chair: <path d="M14 6v36M14 26h30v16" className="stroke-line" strokeWidth="6" />,
  bench: <path d="M4 20h52M13 20v22M47 20v22" className="stroke-line" strokeWidth="6" />,
}
