export const workers: Record<string, string>
export function bundleWorker(name: string, outfile: string): Promise<void>
