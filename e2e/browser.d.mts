export function findBrowser(): Promise<string | null>
export function findOrInstallBrowser(): Promise<string>
