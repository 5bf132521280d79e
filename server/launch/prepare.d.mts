export function prepare(options?: { only?: 'packages'; tell?: (line: string) => void }): Promise<void>
export function chromium(): string | null
