import type { ThemeChoice } from '#src/store/state.ts';

const storageKey = 'ellipsite-theme';
const choices: readonly ThemeChoice[] = ['auto', 'light', 'dark'];
const prefersDark = matchMedia('(prefers-color-scheme: dark)');

/** The theme a choice stands for now. */
export function effectiveTheme(choice: ThemeChoice): 'light' | 'dark' {
  if (choice !== 'auto') return choice;
  return prefersDark.matches ? 'dark' : 'light';
}

/** Calls back when the system changes between light and dark; returns how to stop. */
export function watchTheme(changed: () => void): () => void {
  prefersDark.addEventListener('change', changed);
  return () => prefersDark.removeEventListener('change', changed);
}

/** The choice of an earlier visit; `auto` where none was kept or storage is closed. */
export function keptTheme(): ThemeChoice {
  try {
    const kept = localStorage.getItem(storageKey);
    return choices.find((choice) => choice === kept) ?? 'auto';
  } catch {
    return 'auto';
  }
}

export function keepTheme(choice: ThemeChoice): void {
  try {
    localStorage.setItem(storageKey, choice);
  } catch {
    // Storage may be closed (private windows): the choice then holds for this visit.
  }
}
