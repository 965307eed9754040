export function bundleSource(source: string): Promise<string>
export function importSource(source: string): Promise<unknown>
