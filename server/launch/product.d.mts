export interface StartGiven {
  dataFolder: string
  port: number
  environment?: Record<string, string | undefined>
  fast?: boolean
  tell: (line: string) => void
}

export interface StartedServices {
  url: string
  env: Record<string, string>
  workerEnv: Record<string, string>
  ports: { storage: number; codeHost: number; smtp: number; inbox: number; stamps: number }
  stop(): Promise<void>
}

export function startServices(given: StartGiven): Promise<StartedServices>
export function startProduct(given: StartGiven): Promise<StartedServices>
