import type { CampaignFile, Edit } from '../../lib/campaign/edit/index.js';

/** A campaign as it is kept between visits: the file it began with and what was done to it, so that undo survives a reload. */
export interface KeptCampaign {
  readonly id: string;
  readonly title: string;
  readonly start: CampaignFile;
  readonly edits: readonly Edit[];
  readonly present: CampaignFile;
  /** counts the times it was kept; another tab that has gone on is seen by it */
  readonly revision: number;
  readonly savedAt: string;
}

/** How keeping went. */
export type Keeping =
  | { readonly state: 'kept'; readonly at: string }
  | { readonly state: 'unkept' }
  | { readonly state: 'refused'; readonly why: string }
  /** another tab has kept something newer; this one goes on under a name of its own */
  | { readonly state: 'branched'; readonly at: string };

const DATABASE = 'plumbtick';
const STORE = 'campaigns';

function open(): Promise<IDBDatabase> {
  return new Promise((resolve, reject) => {
    const request = indexedDB.open(DATABASE, 1);
    request.onupgradeneeded = () => request.result.createObjectStore(STORE, { keyPath: 'id' });
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error ?? new Error('storage refused'));
    request.onblocked = () => reject(new Error('storage is held by another page'));
  });
}

const settled = <T>(request: IDBRequest<T>): Promise<T> =>
  new Promise((resolve, reject) => {
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error ?? new Error('storage failed'));
  });

/** Keeps campaigns in the browser. Every call can be refused: a private window, a sandboxed frame, a full store. */
export class Keeper {
  /** All kept campaigns, newest first; empty where storage is refused. */
  async list(): Promise<readonly KeptCampaign[]> {
    try {
      const database = await open();
      try {
        const all = (await settled(database.transaction(STORE).objectStore(STORE).getAll())) as KeptCampaign[];
        return all.sort((a, b) => (a.savedAt < b.savedAt ? 1 : -1));
      } finally {
        database.close();
      }
    } catch {
      return [];
    }
  }

  /** Keeps a campaign if nobody has kept a newer state of it; reads and writes in one transaction, so that two tabs cannot
   *  both win.
   * @returns the revision kept, or null where another tab was first */
  async keep(kept: KeptCampaign): Promise<number | null> {
    const database = await open();
    try {
      return await new Promise<number | null>((resolve, reject) => {
        const transaction = database.transaction(STORE, 'readwrite');
        const store = transaction.objectStore(STORE);
        let result: number | null = null;
        const read = store.get(kept.id);
        read.onsuccess = () => {
          const there = read.result as KeptCampaign | undefined;
          if (there && there.revision !== kept.revision) return;
          result = kept.revision + 1;
          store.put({ ...kept, revision: result });
        };
        transaction.oncomplete = () => resolve(result);
        transaction.onerror = () => reject(transaction.error ?? new Error('storage failed'));
        transaction.onabort = () => reject(transaction.error ?? new Error('storage is full'));
      });
    } finally {
      database.close();
    }
  }

  async forget(id: string): Promise<void> {
    const database = await open();
    try {
      await settled(database.transaction(STORE, 'readwrite').objectStore(STORE).delete(id));
    } finally {
      database.close();
    }
  }
}
