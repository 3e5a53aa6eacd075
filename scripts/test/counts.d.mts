export interface Counts {
  passed: number;
  failed: number;
}
export function oneCheck(exitCode: number): Counts;
export function vitestCounts(file: string, exitCode: number): Counts;
export function playwrightCounts(file: string, exitCode: number): Counts;
export function sum(all: Counts[]): Counts;
