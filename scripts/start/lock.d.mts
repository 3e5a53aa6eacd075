export function lockHolder(file: string): { pid: number } | null;
export function takeLock(file: string, sentence: (holder: { pid: number }) => string): () => void;
