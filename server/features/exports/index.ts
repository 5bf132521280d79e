export { exportJobs } from './jobs.ts'
export { exportRoutes } from './routes.ts'
export { buildExport } from './use-cases/build-export.ts'
export { startExport, type ExportRequest } from './use-cases/start-export.ts'
