export { exportJobs } from './jobs.ts'
export { exportRoutes } from './routes.ts'
