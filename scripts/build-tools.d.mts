export function isStale(name: string): boolean;
export function buildTool(name: string): Promise<void>;
