'use client'
import clsx from 'clsx'
import type { MovementOption } from '@/server/engine/spec/movement'
import styles from './floor-plan.module.css'
import { threeOptions, type StationView } from './scene'
import { REASON_TEXT } from './texts'
import { useDistanceShare } from './use-distance-share'

/** Keys of the three options: easier, as planned, harder. */
const OPTION_KEYS = ['1', '2', '3'] as const

/** From this share of the screen's height on, distance text leaves no room for near text beside it. */
const LARGE_SHARE = 0.066

export function reasonsText(option: MovementOption): string {
  return option.reasons.map((reason) => REASON_TEXT[reason]).join(', ')
}

/**
 * Easier, as planned and harder of one station. The chosen one is filled, and where it is not the
 * planned one it is distance text: then, on a screen that is small for its distance, the other two
 * keep their keys only.
 */
export function OptionColumn({
  view,
  locked,
  onChoose,
  compact = false,
}: {
  view: StationView
  /** Why only the easier option is open, or null. */
  locked: string | null
  onChoose: (option: string) => void
  /** Phone: one line an option. */
  compact?: boolean
}) {
  const distanceIsLarge = useDistanceShare() > LARGE_SHARE
  const three = threeOptions(view)
  const own = view.option && view.option.level !== 'as-planned' ? view.option : null
  const keysOnly = own !== null && distanceIsLarge && !compact
  return (
    <div
      role="group"
      aria-label={`Your option for ${view.name}`}
      className={clsx(styles.optionList, compact && styles.optionListCompact)}
      data-own={own ? '' : undefined}
      data-keys-only={keysOnly ? '' : undefined}
    >
      {three.map((option, index) => {
        if (!option) return null
        const chosen = option.option === view.option?.option
        const barred = locked !== null && option.level !== 'easier'
        const why = barred ? locked : reasonsText(option)
        return (
          <button
            key={option.option}
            type="button"
            aria-pressed={chosen}
            aria-label={[option.name, why].filter(Boolean).join(', ')}
            disabled={barred}
            onClick={() => onChoose(option.option)}
            className={clsx('condensed', styles.optionRow)}
          >
            <span className={clsx('figures', styles.optionKey)}>{OPTION_KEYS[index]}</span>
            {keysOnly ? null : (
              <span className={styles.optionText}>
                <span className={clsx(styles.optionName, chosen && own && styles.optionOwn)}>
                  {option.name}
                </span>
                {why ? (
                  <span data-reason="" className={styles.optionReason}>
                    {why}
                  </span>
                ) : null}
              </span>
            )}
          </button>
        )
      })}
      {keysOnly ? (
        <p
          aria-hidden="true"
          className={clsx('condensed', styles.optionOwn, styles.optionOwnAlone)}
        >
          <span>{own.name}</span>
        </p>
      ) : null}
    </div>
  )
}
