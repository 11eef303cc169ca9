import { Sign } from './sign'

/** What is wrong with one field, beside it. `id`: what the field is described by. */
export function FieldError({ id, children }: { id: string; children: string | undefined }) {
  if (!children) return null
  return (
    <p id={id} className="mt-2 flex gap-2 leading-snug font-semibold text-stop">
      <Sign tone="error" className="mt-[0.06em] size-[1.15em]!" />
      {children}
    </p>
  )
}
