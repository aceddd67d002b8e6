import { useRouteError } from 'react-router-dom'
import { Button } from '../ui/button'
import { Message } from '../ui/message'
import { Page } from '../ui/page'

/** A page that broke: what happened, and a way on. Nothing typed elsewhere is lost by it. */
export function PageFault() {
  const error = useRouteError()
  return (
    <Page title="This page broke">
      <Message
        fault
        title="This page could not be shown."
        action={
          <Button size="small" onClick={() => window.location.reload()}>
            Load it again
          </Button>
        }
      >
        Your data on the server is untouched. What the page said: {error instanceof Error ? error.message : 'nothing'}.
      </Message>
    </Page>
  )
}
