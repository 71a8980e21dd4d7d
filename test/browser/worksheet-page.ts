import type { Locator, Page } from 'playwright-core';

/** The worksheet page as a reader sees it: its parts by their names. */
export class WorksheetPage {
  constructor(readonly page: Page) {}

  /** Waits until the newest text has its results. */
  async settled(): Promise<this> {
    await this.summary.filter({ hasText: /met/ }).waitFor();
    return this;
  }

  get text(): Locator {
    return this.page.getByRole('textbox', { name: 'Worksheet text' });
  }

  get summary(): Locator {
    return this.page.getByRole('banner').getByRole('status');
  }

  get savedState(): Locator {
    return this.page.locator('.saved');
  }

  /** The value beside a named result. */
  value(name: string): Locator {
    return this.page.getByRole('group', { name: `Result ${name}`, exact: true }).locator('.value');
  }

  requirement(label: string): Locator {
    return this.page.getByRole('group', { name: `Requirement ${label}`, exact: true });
  }

  number(name: string): Locator {
    return this.page.getByRole('textbox', { name: new RegExp(`^${name}( in |$)`) });
  }

  slider(name: string): Locator {
    return this.page.getByRole('slider', { name: new RegExp(`^${name},`) });
  }

  button(name: string): Locator {
    return this.page.getByRole('button', { name, exact: true });
  }

  line(text: string): Locator {
    return this.text.locator('.cm-line', { hasText: text });
  }

  /** Replaces a word in a line of the text as a typist would. */
  async retype(line: string, word: string, replacement: string) {
    await this.line(line).click();
    await this.page.keyboard.press('Home');
    for (let step = 0; step < line.indexOf(word); step++) {
      await this.page.keyboard.press('ArrowRight');
    }
    for (let step = 0; step < word.length; step++) {
      await this.page.keyboard.press('Shift+ArrowRight');
    }
    await this.page.keyboard.insertText(replacement);
  }
}
