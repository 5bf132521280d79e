import type { Response } from 'express'
import type { Calculation } from '../../contract/calculations.ts'
import { endpoints } from '../../contract/endpoints.ts'
import { renderSvg } from '../../physics/figure-svg/render-svg.ts'
import { kindDefinitions, parametersJsonSchema } from '../../physics/registry.ts'
import { figureCsv } from '../../physics/table-csv.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { noteOpening, requireEntry } from '../entries/index.ts'
import { requireCalculation } from './access.ts'
import { requireFigure } from './drawn.ts'
import { presentCalculation } from './present.ts'
import { findCalculation, type CalculationRow } from './repository.ts'
import { cancelCalculation } from './use-cases/cancel-calculation.ts'
import { startCalculation, startSuccessor, type Started } from './use-cases/start-calculation.ts'
import { watchCalculation } from './watch.ts'

/** Kinds, starting, watching, stopping, and the outcome as JSON, CSV and SVG. */
export function calculationRoutes(services: Services): Route[] {
  async function present(id: string): Promise<Calculation> {
    return presentCalculation(services, (await findCalculation(services.db, id)) as CalculationRow)
  }

  async function answerStarted({ id, known }: Started) {
    return answer(await present(id), {
      status: known ? 201 : 202,
      headers: { location: `/api/v1/calculations/${id}` },
    })
  }

  async function read(actor: Actor, id: string): Promise<CalculationRow> {
    const { calculation, entry } = await requireCalculation(services, actor, id)
    await noteOpening(services, actor, entry, 'calculation', id)
    return calculation
  }

  return [
    route(endpoints.listCalculationKinds, () => ({
      items: kindDefinitions.map((definition) => ({
        kind: definition.kind,
        version: definition.version,
        title: definition.title,
        summary: definition.summary,
        inputs: definition.inputs,
        parameters: parametersJsonSchema(definition),
        example: definition.example.parameters,
      })),
      nextCursor: null,
    })),
    route(endpoints.startCalculation, async ({ actor, params, body }) =>
      answerStarted(await startCalculation(services, actor, params.id, body)),
    ),
    route(endpoints.recompute, async ({ actor, params, body }) => {
      const { calculation } = await requireCalculation(services, actor, params.id)
      return answerStarted(await startSuccessor(services, actor, calculation, body.parameters))
    }),
    route(endpoints.getCalculation, async ({ actor, params }) =>
      presentCalculation(services, await read(actor, params.id)),
    ),
    route(endpoints.cancelCalculation, async ({ actor, params }) => {
      const { calculation } = await requireCalculation(services, actor, params.id)
      await cancelCalculation(services, actor, calculation)
      return present(params.id)
    }),
    route(endpoints.watchCalculation, async (context) => {
      const { calculation } = await requireCalculation(services, context.actor, context.params.id)
      const mayStillRead = () =>
        requireEntry(services, context.actor, calculation.entryId, 'read').then(
          () => true,
          () => false,
        )
      await watchCalculation(services, context, mayStillRead)
      return undefined
    }),
    route(endpoints.getCalculationFigure, async ({ actor, params }) =>
      requireFigure(services, await read(actor, params.id)),
    ),
    route(endpoints.getCalculationCsv, async ({ actor, params, res }) => {
      const calculation = await read(actor, params.id)
      send(
        res,
        'text/csv; charset=utf-8',
        `C${calculation.label}.csv`,
        figureCsv(await requireFigure(services, calculation)),
      )
      return undefined
    }),
    route(endpoints.getCalculationSvg, async ({ actor, params, res }) => {
      const calculation = await read(actor, params.id)
      send(
        res,
        'image/svg+xml',
        `C${calculation.label}.svg`,
        renderSvg(await requireFigure(services, calculation)),
      )
      return undefined
    }),
  ]
}

/** A file to be saved, never run at our origin (threat B12). */
function send(res: Response, type: string, name: string, text: string): void {
  res.set({
    'content-type': type,
    'content-disposition': `attachment; filename="${name}"`,
    'content-security-policy': "sandbox; default-src 'none'",
  })
  res.send(text)
}
