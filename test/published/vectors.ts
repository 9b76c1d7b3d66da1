import { readFileSync } from 'node:fs';

interface Quantified {
  readonly value: number | string;
  readonly unit: string;
}

/** A check value with the publication it comes from. */
export interface Vector {
  readonly id: string;
  readonly section: number;
  readonly method: string;
  readonly inputs: Readonly<Record<string, Quantified | string>> | string;
  readonly expected: number | string;
  readonly tolerance: number | null;
  readonly unit: string;
  readonly source: string;
}

interface VectorFile {
  readonly count: number;
  readonly vectors: readonly Vector[];
}

const file = JSON.parse(
  readFileSync(new URL('./vectors.json', import.meta.url), 'utf8'),
) as VectorFile;

export const vectors = file.vectors;
export const printedCount = file.count;

/** The number given for an input; throws when the vector has no such number. */
export function input({ id, inputs }: Vector, name: string): number {
  const given = typeof inputs === 'string' ? undefined : inputs[name];
  const value = typeof given === 'object' ? given.value : undefined;
  if (typeof value !== 'number') throw new Error(`${id} has no number ${name}`);
  return value;
}

/** The text given for an input; throws when the vector has no such text. */
export function text({ id, inputs }: Vector, name: string): string {
  const given = typeof inputs === 'string' ? undefined : inputs[name];
  const value = typeof given === 'object' ? given.value : given;
  if (typeof value !== 'string') throw new Error(`${id} has no text ${name}`);
  return value;
}

/** Computes a vector's expected number from its inputs. */
export type Compute = (vector: Vector) => number;

/** The printed ends of a range such as 84.4-106.8. */
export function printedRange({ id, expected }: Vector): [number, number] {
  const [lower, upper] = String(expected).split('-').map(Number);
  if (lower === undefined || upper === undefined) throw new Error(`${id} prints no range`);
  return [lower, upper];
}
