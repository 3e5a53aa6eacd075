export function checkPort(host: string, port: number, variable: string, what: string): Promise<void>;
