import { isRouteErrorResponse, useRouteError } from 'react-router-dom'
import { ApiProblem } from '../lib/api-problem.ts'
import { Button, ButtonLink } from '../ui/button.tsx'
import { Ground } from '../ui/ground.tsx'
import { Icon } from '../ui/icon.tsx'
import { paths } from './paths.ts'
import './error-page.css'

interface Words {
  title: string
  detail: string
  code: string
}

/** What happened, what is safe, what to do; the code last, for the lab manager. */
export function ErrorPage() {
  const { title, detail, code } = wordsOf(useRouteError())
  return (
    <Ground>
      <section className="hs-sheet hs-alert" role="alert">
        <Icon name="alert" size={26} />
        <div>
          <h1>{title}</h1>
          <p>{detail}</p>
          <p className="hs-quiet">
            Code <span className="hs-fig">{code}</span>, for the lab manager.
          </p>
        </div>
        <div className="hs-alert-actions">
          <Button kind="primary" onClick={() => location.reload()}>
            Try again
          </Button>
          <ButtonLink to={paths.bench}>Go to the bench</ButtonLink>
        </div>
      </section>
    </Ground>
  )
}

function wordsOf(error: unknown): Words {
  if (isRouteErrorResponse(error) || (error instanceof ApiProblem && error.status === 404)) {
    return {
      title: 'There is nothing here',
      detail: 'The address is not known, or what it names is not yours to read. Nothing was changed.',
      code: 'not-found',
    }
  }
  if (error instanceof ApiProblem) return { title: error.title, detail: error.detail, code: error.code }
  return {
    title: 'This page could not be drawn',
    detail: `What was saved is safe; what is on other pages is not touched. Reload the page. (${
      error instanceof Error ? error.message : 'no reason was given'
    })`,
    code: 'page',
  }
}
