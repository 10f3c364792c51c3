import { db } from '#db/client';
import { config } from '#lib/config/index';
import { opensKey, rewrapKey } from '#lib/services/complaints/personalData';
import { placeOf } from '#lib/services/people/secondFactor';
import { openSealed, sealBytes } from '#lib/services/sealing';
import { unwrapPrivate, wrapPrivate } from '#lib/services/summaries/seal/keys';

interface Row {
  id: string | number;
  /** What it is sealed for, besides its id: the network of a signing key. */
  of: number;
  sealed: Buffer;
}

/** A column whose bytes are sealed under the settings' key. */
export interface SealedColumn {
  /** What its rows are called, such as `complaint`. */
  noun: string;
  rows(): Promise<Row[]>;
  opens(row: Row): boolean;
  /** Sealed anew. @throws where the earlier key does not open it. */
  resealed(row: Row, before: Buffer): Buffer;
  /** Stores what was sealed anew, unless the row was changed meanwhile. */
  store(row: Row, sealed: Buffer): Promise<unknown>;
}

const opens = (open: () => unknown): boolean => {
  try {
    open();
    return true;
  } catch {
    return false;
  }
};

function columnOf(table: string, key: string, column: string, of = key) {
  return {
    rows: async () => (await db()(table).orderBy(key).select({ id: key, of, sealed: column })) as Row[],
    store: ({ id, sealed }: Row, anew: Buffer) =>
      db()(table)
        .where({ [key]: id, [column]: sealed })
        .update({ [column]: anew }),
  };
}

/** Everything in the database that the settings' key opens by itself. */
export const SEALED_COLUMNS: readonly SealedColumn[] = [
  {
    noun: 'complaint',
    ...columnOf('complaint_keys', 'complaint_id', 'wrapped_key'),
    opens: ({ id, sealed }) => opensKey(sealed, Number(id)),
    resealed: ({ id, sealed }, before) => rewrapKey(sealed, Number(id), before),
  },
  {
    noun: 'second factor of person',
    ...columnOf('second_factors', 'user_id', 'sealed_secret'),
    opens: ({ id, sealed }) => opens(() => openSealed(config().personalDataKey, placeOf(String(id)), sealed)),
    resealed: ({ id, sealed }, before) => {
      const place = placeOf(String(id));
      return sealBytes(config().personalDataKey, place, openSealed(before, place, sealed));
    },
  },
  {
    noun: 'signing key',
    ...columnOf('summary_keys', 'id', 'wrapped_private', 'network_id'),
    opens: ({ of, sealed }) => opens(() => unwrapPrivate(of, sealed, config().personalDataKey)),
    resealed: ({ of, sealed }, before) => wrapPrivate(of, unwrapPrivate(of, sealed, before)),
  },
];
