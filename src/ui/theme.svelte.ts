/** The look of the page: as the system has it, or as chosen on the page. */
export type Theme = 'system' | 'light' | 'dark';

const KEY = 'loopwright theme';
const NEXT: Readonly<Record<Theme, Theme>> = { system: 'light', light: 'dark', dark: 'system' };

export class ThemeChoice {
  theme = $state<Theme>(stored());

  constructor() {
    this.apply();
  }

  /** Goes on to the next of system, light, dark. */
  next(): void {
    this.theme = NEXT[this.theme];
    localStorage.setItem(KEY, this.theme);
    this.apply();
  }

  private apply(): void {
    const { dataset } = document.documentElement;
    if (this.theme === 'system') delete dataset.theme;
    else dataset.theme = this.theme;
  }
}

function stored(): Theme {
  const theme = localStorage.getItem(KEY);
  return theme === 'light' || theme === 'dark' ? theme : 'system';
}
