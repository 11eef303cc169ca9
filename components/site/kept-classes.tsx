'use client'
import { useEffect, useState } from 'react'
import { Button, buttonClass } from '@/components/ui/button'
import { keptClasses, type KeptClass } from '@/hooks/player/service-worker'

/** What can be done without a network: a class that this browser has, and trying again. */
export function KeptClasses() {
  const [classes, setClasses] = useState<KeptClass[]>([])
  useEffect(() => {
    void keptClasses().then(setClasses)
    const retry = () => window.location.reload()
    window.addEventListener('online', retry)
    return () => window.removeEventListener('online', retry)
  }, [])
  return (
    <>
      {classes.length > 0 ? (
        <div>
          <p>You opened this on this computer, and it can be played now:</p>
          <ul>
            {classes.map(({ path, title }) => (
              <li key={path}>
                {/* A whole page, so that the service worker gives it. */}
                <a className={buttonClass('text')} href={path}>
                  {title}
                </a>
              </li>
            ))}
          </ul>
        </div>
      ) : null}
      <Button onClick={() => window.location.reload()}>Try again</Button>
    </>
  )
}
