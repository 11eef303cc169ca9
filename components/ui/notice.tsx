import clsx from 'clsx'
import type { ReactNode, Ref } from 'react'
import { Sign } from './sign'

interface NoticeProps {
  tone: 'info' | 'error' | 'saved'
  children: ReactNode
  className?: string
  /** To give it the focus: what went wrong is then read, and seen, first. */
  ref?: Ref<HTMLDivElement>
}

const TONES = {
  info: { edge: 'border-rest', word: 'Note', role: 'note' },
  error: { edge: 'border-stop', word: 'Not done', role: 'alert' },
  saved: { edge: 'border-done', word: 'Done', role: 'status' },
} as const

/** A sentence on a line of paint; the tone has a word and a shape as well as a colour. */
export function Notice({ tone, children, className, ref }: NoticeProps) {
  const { edge, word, role } = TONES[tone]
  return (
    <div
      {...(ref ? { ref, tabIndex: -1 } : {})}
      role={role}
      className={clsx('flex gap-3 border-b-4 bg-raised px-4 py-3 leading-snug', edge, className)}
    >
      <Sign tone={tone} />
      <div className="min-w-0">
        <strong className="sr-only">{word}: </strong>
        {children}
      </div>
    </div>
  )
}
