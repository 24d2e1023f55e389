import { z } from 'zod';

/**
 * An array that is read only in its type, as the records it describes are. (zod's own `.readonly()` freezes every array it has
 * parsed and publishes `readOnly`, which in OpenAPI means that a request must not send it.)
 */
export function list<Item extends z.ZodType>(
  item: Item,
  bounds: { readonly min?: number; readonly max?: number } = {},
) {
  let array = z.array(item);
  if (bounds.min !== undefined) array = array.min(bounds.min);
  if (bounds.max !== undefined) array = array.max(bounds.max);
  return array as unknown as z.ZodType<readonly z.output<Item>[], readonly z.input<Item>[]>;
}
