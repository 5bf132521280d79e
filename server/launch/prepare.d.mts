export function prepare(options?: { only?: 'packages' }): Promise<void>
export function chromium(): string | null
