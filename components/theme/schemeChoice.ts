/** What a person chose: a fixed scheme, or to follow the system. */
export type SchemeChoice = 'light' | 'dark' | 'system';

const storageKey = 'trayward.scheme';

/** Reads the stored choice; `system` where there is none or storage is closed (private windows may refuse it). */
export function readSchemeChoice(): SchemeChoice {
  try {
    const stored = localStorage.getItem(storageKey);
    return stored === 'light' || stored === 'dark' ? stored : 'system';
  } catch {
    return 'system';
  }
}

export function storeSchemeChoice(choice: SchemeChoice): void {
  try {
    if (choice === 'system') localStorage.removeItem(storageKey);
    else localStorage.setItem(storageKey, choice);
  } catch {
    // The choice then lasts for this visit only.
  }
}
