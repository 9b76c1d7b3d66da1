import * as z from 'zod';
import { formExpand, formInteger, missing } from './api-error';

const window = z
  .strictObject({
    gt: formInteger.optional(),
    gte: formInteger.optional(),
    lt: formInteger.optional(),
    lte: formInteger.optional(),
  })
  .optional();

/** The parameters that every list takes. */
export const listParameters = z.strictObject({
  limit: formInteger.pipe(z.int().min(1).max(100)).default(10),
  starting_after: z.string().optional(),
  ending_before: z.string().optional(),
  created: window,
  expand: formExpand,
});
type ListParameters = z.output<typeof listParameters>;

interface Listed {
  id: string;
  created: number;
}

export interface ListAnswer {
  object: 'list';
  url: string;
  has_more: boolean;
  data: Listed[];
}

/**
 * A page of a list, newest first, as the service pages: by the id before or after it.
 * @param objects oldest first, as they were kept
 */
export function page(
  url: string,
  objects: readonly Listed[],
  { limit, starting_after: after, ending_before: before, created }: ListParameters,
): ListAnswer {
  const newestFirst = objects
    .filter(
      (object) =>
        object.created > (created?.gt ?? -1) &&
        object.created >= (created?.gte ?? 0) &&
        object.created < (created?.lt ?? Infinity) &&
        object.created <= (created?.lte ?? Infinity),
    )
    .reverse();
  const placeOf = (id: string, param: string): number => {
    const index = newestFirst.findIndex((object) => object.id === id);
    if (index < 0) throw missing('object', id, param);
    return index;
  };
  const answer = (data: Listed[], more: boolean): ListAnswer => ({
    object: 'list',
    url,
    has_more: more,
    data,
  });
  if (before !== undefined) {
    const end = placeOf(before, 'ending_before');
    const start = Math.max(0, end - limit);
    return answer(newestFirst.slice(start, end), start > 0);
  }
  const start = after === undefined ? 0 : placeOf(after, 'starting_after') + 1;
  return answer(newestFirst.slice(start, start + limit), start + limit < newestFirst.length);
}
