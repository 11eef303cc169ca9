import clsx from 'clsx'
import type { ReactNode } from 'react'

interface NoticeProps {
  tone: 'info' | 'error' | 'saved'
  children: ReactNode
  className?: string
}

const TONES = {
  info: { edge: 'border-rest', word: 'Note', role: 'note' },
  error: { edge: 'border-stop', word: 'Not done', role: 'alert' },
  saved: { edge: 'border-done', word: 'Done', role: 'status' },
} as const

/** A sentence set off by a painted edge; the tone has a word as well as a colour. */
export function Notice({ tone, children, className }: NoticeProps) {
  const { edge, word, role } = TONES[tone]
  return (
    <div role={role} className={clsx('border-l-8 py-1 pl-4', edge, className)}>
      <strong className="sr-only">{word}: </strong>
      {children}
    </div>
  )
}
