import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { type Browser, type FrameLocator, type Locator, type Page, chromium as playwright } from 'playwright-core';
import { placeOfWord } from './inPage.js';
import { chromium, output } from './machine';

const flags = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
];

export const openBrowser = (): Promise<Browser> => playwright.launch({ executablePath: chromium!, headless: true, args: flags });

/** The editor's window, seen as a person sees it. */
export class Workbench {
  private constructor(readonly page: Page) {}

  /** Opens `workspace` with `file` in it. */
  static async open(browser: Browser, address: string, workspace: string, file: string): Promise<Workbench> {
    const page = await browser.newPage({ viewport: { width: 1400, height: 900 } });
    page.setDefaultTimeout(15_000);
    const resource = `vscode-remote://${new URL(address).host}${join(workspace, file)}`;
    const payload = JSON.stringify([['openFile', resource]]);
    await page.goto(`${address}/?folder=${encodeURIComponent(workspace)}&payload=${encodeURIComponent(payload)}`);
    await page.locator('.editor-instance .view-line').first().waitFor({ timeout: 60_000 });
    return new Workbench(page);
  }

  get squiggles(): Locator {
    return this.page.locator('.squiggly-error');
  }

  /** The page that the editor shows in a frame within a frame: a rendered document. */
  get webview(): FrameLocator {
    return this.page.frameLocator('iframe.webview.ready').frameLocator('#active-frame');
  }

  /** What a person sees when the pointer rests on `word`, once it holds a `part` (numbers follow the first verdicts). */
  async hover(word: string, part: string): Promise<Locator> {
    const hover = this.page.locator('.monaco-hover:visible').filter({ hasText: word }).first();
    await this.persist(async () => {
      const { x, y } = await this.placeOf(word);
      await this.page.mouse.move(x + 200, y + 300);
      await hover.waitFor({ state: 'hidden' });
      await this.page.mouse.move(x - 2, y);
      await this.page.mouse.move(x, y);
      await hover.locator(part).first().waitFor({ timeout: 3000 });
    });
    return hover;
  }

  /** Opens the menu of quick fixes at `word`. Returns its entries. */
  async openQuickFixes(word: string): Promise<string[]> {
    const rows = this.page.locator('.action-widget .monaco-list-row.action');
    await this.persist(async () => {
      await this.page.keyboard.press('Escape');
      const { x, y } = await this.placeOf(word);
      await this.page.mouse.click(x, y);
      await this.page.keyboard.press('Control+.');
      await rows.first().waitFor({ timeout: 3000 });
    });
    return rows.allInnerTexts();
  }

  /** Takes the entry of the open menu that begins with `title`, with the keyboard: the mouse is blocked until it moves. */
  async takeQuickFix(title: string): Promise<void> {
    const rows = this.page.locator('.action-widget .monaco-list-row.action');
    const titles = await rows.allInnerTexts();
    const wanted = titles.findIndex(one => one.trim().startsWith(title));
    if (wanted < 0) throw new Error(`no quick fix "${title}" among ${titles.join(' | ')}`);
    for (let tries = 0; tries < titles.length && !(await rows.nth(wanted).getAttribute('class'))?.includes('focused'); tries++) {
      await this.page.keyboard.press('ArrowDown');
    }
    await this.page.keyboard.press('Enter');
    await this.page.locator('.action-widget').waitFor({ state: 'hidden' });
  }

  async save(): Promise<void> {
    await this.page.keyboard.press('Control+S');
    await this.page.locator('.tab.active.dirty').waitFor({ state: 'detached' });
  }

  async screenshot(name: string): Promise<void> {
    mkdirSync(output, { recursive: true });
    await this.page.screenshot({ path: join(output, `${name}.png`) });
  }

  /** Does what a person does when a menu doesn't open: tries again. */
  private async persist(attempt: () => Promise<void>): Promise<void> {
    for (let tries = 1; ; tries++) {
      try {
        return await attempt();
      } catch (error) {
        if (tries === 6) throw error;
      }
    }
  }

  /** The middle of the first occurrence of `word`, in pixels. Waits until it is on the screen. */
  private async placeOf(word: string): Promise<{ x: number; y: number }> {
    const place = await this.page.waitForFunction(placeOfWord, word);
    return (await place.jsonValue())!;
  }
}
