export { openComputePool, type ComputePool } from './compute-pool.ts'
export { drawFigure } from './drawn.ts'
export { calculationJobs } from './jobs.ts'
export { inputFiles, isStale, presentSummary } from './present.ts'
export {
  calculationsOfEntry,
  findCalculation,
  resultBytes,
  type CalculationRow,
  type FileInput,
} from './repository.ts'
export { calculationRoutes } from './routes.ts'
export { startCalculation, startSuccessor } from './use-cases/start-calculation.ts'
export { runCalculation } from './use-cases/run-calculation.ts'
