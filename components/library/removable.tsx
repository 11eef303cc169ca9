import type { ReactNode } from 'react'
import { Button } from '@/components/ui/button'

interface SmallButtonProps {
  label: string
  name: string
  onClick: () => void
  /** At its end it stays reachable, so that the focus is not lost under the finger. */
  isOff?: boolean
  'data-move'?: string
}

export function SmallButton({ label, name, onClick, isOff = false, ...rest }: SmallButtonProps) {
  return (
    <Button
      look="outlined"
      aria-disabled={isOff}
      onClick={isOff ? undefined : onClick}
      className="min-h-11! px-3! py-1! text-base! aria-disabled:cursor-not-allowed! aria-disabled:border-line-lesser aria-disabled:text-text-quiet"
      {...rest}
    >
      {label}
      <span className="sr-only">: {name}</span>
    </Button>
  )
}

interface RemovableProps {
  isRemoved: boolean
  name: string
  onPutBack: () => void
  className?: string
  children: ReactNode
  'data-option'?: string
  'data-fault'?: string
}

/** A part of the form. Removed it is not sent, but nothing typed in it is lost: it can be put back. */
export function Removable({
  isRemoved,
  name,
  onPutBack,
  className,
  children,
  ...rest
}: RemovableProps) {
  return (
    <li className={className} {...rest}>
      {isRemoved ? (
        <p className="flex flex-wrap items-center gap-x-4 text-text-quiet">
          Removed: {name}
          <Button look="text" data-put-back="" onClick={onPutBack}>
            Put it back<span className="sr-only">: {name}</span>
          </Button>
        </p>
      ) : null}
      <fieldset disabled={isRemoved} hidden={isRemoved} className="min-w-0">
        {children}
      </fieldset>
    </li>
  )
}
