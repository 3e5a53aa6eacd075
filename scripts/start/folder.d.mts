export function prepareFolder(dataDir: string, kind: "demo" | "live" | "test"): void;
export function emptyFolder(dataDir: string, kept: string[]): void;
export function makeSecrets(dataDir: string): void;
export function readSecretFile(dataDir: string, name: string): string;
