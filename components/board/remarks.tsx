import clsx from 'clsx'
import type { Remark } from './to-know'

/** Remarks of a row, the worst first: that one at once, the others when asked for. */
export function Remarks({ remarks }: { remarks: readonly Remark[] }) {
  const shown = remarks.slice(0, 1)
  const rest = remarks.slice(1)
  return (
    <>
      {shown.map((remark, index) => (
        <RemarkLine key={index} remark={remark} />
      ))}
      {rest.length > 0 ? (
        <details>
          <summary className="cursor-pointer text-sm text-rest underline">
            {rest.length} more
          </summary>
          {rest.map((remark, index) => (
            <RemarkLine key={index} remark={remark} />
          ))}
        </details>
      ) : null}
    </>
  )
}

function RemarkLine({ remark }: { remark: Remark }) {
  return (
    <p
      className={clsx(
        'text-[15px] leading-tight',
        remark.weight === 'stop' && 'font-bold text-stop',
        remark.weight === 'pain' && 'font-bold',
        remark.weight === 'plain' && 'text-text-quiet',
      )}
    >
      {remark.text}
      {remark.more ? (
        <span className="block text-[13px] leading-tight font-normal text-text">{remark.more}</span>
      ) : null}
    </p>
  )
}
