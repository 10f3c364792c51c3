import { useState } from 'react';

/** The same list object for as long as its items are the same, so that what is made of it need not be made again. */
export function useStable<T>(items: readonly T[]): readonly T[] {
  const [kept, setKept] = useState(items);
  const isSame = kept.length === items.length && kept.every((item, at) => item === items[at]);
  if (isSame) return kept;
  setKept(items);
  return items;
}
