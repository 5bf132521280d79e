import type { Figure } from '../../contract/figure.ts'
import { Problem } from '../../contract/problems.ts'
import { kindDefinition } from '../../physics/registry.ts'
import type { Services } from '../../platform/services.ts'
import { resultBytes, type CalculationRow } from './repository.ts'

/** The figure of a finished calculation as data; null for a kind that draws nothing. */
export async function drawFigure(services: Services, calculation: CalculationRow): Promise<Figure | null> {
  if (calculation.resultSha256 === null)
    throw new Problem('wrong-state', `C${calculation.label} has no result yet: it is ${calculation.status}.`)
  const result: unknown = JSON.parse(
    (await resultBytes(services.db, calculation.resultSha256)).toString('utf8'),
  )
  const { figure } = await kindDefinition(calculation.kind, calculation.version).loadFigure()
  return figure(result, calculation.parameters)
}

/** The same for those who asked for a picture: a kind without one is told so. */
export async function requireFigure(services: Services, calculation: CalculationRow): Promise<Figure> {
  const figure = await drawFigure(services, calculation)
  if (figure === null)
    throw new Problem('not-found', `A calculation of the kind ${calculation.kind} has no figure.`)
  return figure
}
