import { useEffect, useState } from 'react'
import { useBlocker } from 'react-router-dom'
import type { ContentSaver } from '../../features/entries/content-saver.ts'
import { Button } from '../../ui/button.tsx'
import { Dialog } from '../../ui/dialog.tsx'

/** Going to another place saves first. Where that is not possible, it asks, and the harmless choice is to stay. */
export function LeaveGuard({ saver }: { saver: ContentSaver }) {
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) =>
      currentLocation.pathname !== nextLocation.pathname && saver.hasUnsaved(),
  )
  const [asking, setAsking] = useState(false)

  useEffect(() => {
    if (blocker.state !== 'blocked') return
    let given = false
    void saver.flush().then(() => {
      if (given) return
      if (saver.hasUnsaved()) setAsking(true)
      else blocker.proceed()
    })
    return () => {
      given = true
    }
  }, [blocker, saver])

  function stay() {
    setAsking(false)
    blocker.reset?.()
  }

  return (
    <Dialog
      open={asking}
      onClose={stay}
      title="This text is not saved"
      about="The server did not take the last of what you wrote. If you go now, that part is lost; stay, and it is tried again."
      actions={
        <>
          <Button kind="primary" onClick={stay}>
            Stay
          </Button>
          <Button kind="danger" onClick={() => blocker.proceed?.()}>
            Leave and lose it
          </Button>
        </>
      }
    />
  )
}
