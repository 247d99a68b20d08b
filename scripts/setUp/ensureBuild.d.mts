export function ensureBuild(): Promise<string>
