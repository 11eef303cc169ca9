import clsx from 'clsx'
import Link from 'next/link'
import type { ButtonHTMLAttributes, ComponentProps } from 'react'

type Look = 'filled' | 'outlined' | 'stop' | 'text'

const LOOKS: Record<Look, string> = {
  filled: 'bg-button text-on-button hover:underline',
  outlined: 'border-line border-4 hover:bg-fill',
  stop: 'border-stop border-4 text-stop hover:bg-stop hover:text-ground',
  text: 'text-rest underline decoration-3 underline-offset-6 hover:decoration-present',
}

/** Every action is a verb on a block of paint. */
export function buttonClass(look: Look, className?: string): string {
  return clsx(
    'inline-flex min-h-12 cursor-pointer items-center justify-center text-center decoration-3 underline-offset-6 disabled:cursor-not-allowed disabled:opacity-60 aria-disabled:cursor-progress',
    look === 'text'
      ? 'px-0 font-semibold'
      : 'px-6 py-2.5 condensed text-[1.2rem] leading-tight tracking-[0.005em]',
    LOOKS[look],
    className,
  )
}

interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  look?: Look
}

export function Button({ look = 'filled', className, type = 'button', ...rest }: ButtonProps) {
  return <button type={type} className={buttonClass(look, className)} {...rest} />
}

interface LinkButtonProps extends ComponentProps<typeof Link> {
  look?: Look
}

export function LinkButton({ look = 'filled', className, ...rest }: LinkButtonProps) {
  return (
    <Link
      className={buttonClass(look, typeof className === 'string' ? className : undefined)}
      {...rest}
    />
  )
}
