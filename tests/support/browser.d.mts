export const chromiumArguments: string[];
export function findBrowser(): string | null;
