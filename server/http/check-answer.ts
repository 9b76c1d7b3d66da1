import { isDeepStrictEqual } from 'node:util';
import * as z from 'zod';
import type { AnyAnswer, RouteDefinition } from './route';

/**
 * Holds an answer against its contract; used in tests, where a field too many or too few must be seen.
 * @throws when the status is not declared, or the body is not what the contract would let through
 */
export function checkAnswer({ method, path, response }: RouteDefinition, answer: AnyAnswer): void {
  const schema = response[answer.status];
  const name = `${method.toUpperCase()} ${path} ${answer.status}`;
  if (schema === undefined) throw new Error(`${name} is not in the contract`);
  if (!(schema instanceof z.ZodType)) return;
  const sent: unknown = JSON.parse(JSON.stringify(answer.body));
  const parsed = schema.safeParse(sent);
  if (!parsed.success) throw new Error(`${name}: ${z.prettifyError(parsed.error)}`);
  if (!isDeepStrictEqual(parsed.data, sent)) {
    throw new Error(`${name} holds more than the contract: ${JSON.stringify(sent)}`);
  }
}
