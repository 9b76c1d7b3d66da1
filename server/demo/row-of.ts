import type * as schema from '../database/schema';

type Table = {
  [T in keyof typeof schema]: (typeof schema)[T] extends { $inferInsert: object } ? T : never;
}[keyof typeof schema];

type WithId<R> = R extends { id?: string | undefined } ? R & { readonly id: string } : R;

/** A row to add to a table; the story makes every id itself. */
export type RowOf<T extends Table> = WithId<(typeof schema)[T]['$inferInsert']>;
