import type { NewEntry } from '@/lib/schemas/run-shapes';

/** A step that the server has not confirmed yet, with the number it is to have. */
export interface Unsaved {
  readonly seq: number;
  readonly entry: NewEntry;
}

/** Where unsaved steps outlive the page. */
export interface Shelf {
  put(unsaved: Unsaved): boolean;
  drop(id: string): void;
  all(): Unsaved[];
}

function isUnsaved(value: unknown): value is Unsaved {
  if (typeof value !== 'object' || value === null) return false;
  const { seq, entry } = value as Partial<Unsaved>;
  return typeof seq === 'number' && typeof entry?.id === 'string' && typeof entry.step === 'object';
}

function parsed(text: string | null): unknown {
  try {
    return JSON.parse(text ?? '');
  } catch {
    return null;
  }
}

/**
 * One key for each step, so that two tabs on one run do not overwrite each other's; the id sees to it that a step
 * which both find is stored once. Kept apart by person: nobody sends what somebody else typed on the same device.
 */
export function shelfFor(storage: Storage | null, person: string, run: string): Shelf {
  const prefix = `nineover.unsaved.${person}.${run}.`;
  return {
    put(unsaved) {
      try {
        storage?.setItem(prefix + unsaved.entry.id, JSON.stringify(unsaved));
        return storage !== null;
      } catch {
        // Full or forbidden: the step still lives in the page, and leaving it asks first.
        return false;
      }
    },
    drop(id) {
      storage?.removeItem(prefix + id);
    },
    all() {
      if (!storage) return [];
      const keys = Array.from({ length: storage.length }, (_, index) => storage.key(index) ?? '');
      return keys
        .filter((key) => key.startsWith(prefix))
        .map((key) => parsed(storage.getItem(key)))
        .filter(isUnsaved)
        .sort((one, other) => one.seq - other.seq || (one.entry.id < other.entry.id ? -1 : 1));
    },
  };
}

/** The browser's own storage, or null where it is forbidden. */
export function browserStorage(): Storage | null {
  try {
    return globalThis.localStorage ?? null;
  } catch {
    return null;
  }
}
