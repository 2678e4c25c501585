import { expect, type Locator, type Page } from '@playwright/test';

/** W10: two taps of one control within 700 ms count once. */
const PACE_MS = 720;

/** The stand as somebody works with it: by what is on the screen, never by what is behind it. */
export class StandTablet {
  private pressedAt = 0;

  constructor(
    readonly page: Page,
    /** Everything by keys: digits and Enter. */
    readonly byKeys = false,
  ) {
    page.setDefaultTimeout(10_000);
  }

  id(testId: string): Locator {
    return this.page.getByTestId(testId);
  }

  /** What the screen asks for now. */
  async asks(): Promise<string> {
    return ((await this.id('instruction').first().textContent()) ?? '').replace(/\s+/g, ' ').trim();
  }

  /** Everything that the screen says. */
  words(): Promise<string> {
    return this.page.locator('body').innerText();
  }

  private heading(): Promise<string> {
    return this.page
      .locator('h2, h1')
      .allInnerTexts()
      .then((texts) => texts.join(' | '));
  }

  async enrol(code: string, name: string): Promise<void> {
    await this.id('enrol-code').fill(code);
    await this.id('enrol-name').fill(name);
    await this.id('enrol-go').click();
    await this.page.waitForURL(/sign-in/);
  }

  async typePin(pin: string): Promise<void> {
    for (const digit of pin) await this.page.keyboard.press(digit, { delay: 40 });
  }

  async signIn(name: string, pin: string): Promise<void> {
    await this.page.locator('[data-testid^=person-]', { hasText: name }).click();
    await this.typePin(pin);
  }

  /** Job → joint → begin a walk of the joint's own purpose. */
  async begin(job: string, joint: RegExp): Promise<void> {
    await this.id(`job-${job}`).click();
    await this.page.getByRole('button', { name: joint }).first().click();
    await this.id('begin').click();
    await this.page.waitForURL(/\/stand\/walks\//);
  }

  /** Writes into a field; by keys it has the focus already, and Enter goes on. */
  private async fill(testId: string, text: string): Promise<void> {
    if (!this.byKeys) return this.id(testId).fill(text);
    await expect(this.id(testId)).toBeFocused();
    await this.page.keyboard.type(text, { delay: 60 });
    await this.page.keyboard.press('Enter');
  }

  /** New parts at the stand: number, batch, count. */
  async takePart(number: string, batch: string, count: string): Promise<void> {
    await this.fill('part-number', number);
    await this.fill('part-batch', batch);
    const before = await this.heading();
    await this.fill('part-count', count);
    if (!this.byKeys) await this.id('part-count').press('Enter');
    await expect.poll(() => this.heading(), { timeout: 8_000 }).not.toBe(before);
  }

  /** Confirms steps until something else is asked. */
  async prepare(): Promise<void> {
    for (;;) {
      await this.id('step-done').or(this.id('wrench-tag')).or(this.id('record')).first().waitFor();
      if (!(await this.id('step-done').isVisible())) return;
      await this.press('step-done').catch(async (error: unknown) => {
        if (await this.id('step-done').isVisible()) throw error;
      });
    }
  }

  /** Takes a wrench: tag typed, last three of its serial confirmed, everything on it looked at (W3). */
  async takeWrench(tag: string, lastThree: string): Promise<void> {
    await this.fill('wrench-tag', tag);
    if (!this.byKeys) await this.id('wrench-tag').press('Enter');
    await this.id('wrench-serial').waitFor();
    if (this.byKeys) await this.fill('wrench-serial', lastThree);
    else {
      await this.type(lastThree);
      await this.press('wrench-serial-ok');
    }
    await this.tickAll();
    await this.press('wrench-take');
    if (await this.sees('choice-thisPull')) await this.choose('thisPull');
    await this.id('record').waitFor();
  }

  /** Whether a control comes up within a moment; screens follow a saved event. */
  async sees(testId: string, within = 900): Promise<boolean> {
    return this.id(testId)
      .first()
      .waitFor({ state: 'visible', timeout: within })
      .then(
        () => true,
        () => false,
      );
  }

  /** The main button of the screen. A second tap or Enter within 700 ms would not count (W10), so a person's pace is kept. */
  async press(testId: string): Promise<void> {
    const before = await this.words();
    const rest = this.pressedAt + PACE_MS - Date.now();
    await this.page.waitForTimeout(this.byKeys ? Math.max(rest, PACE_MS) : Math.max(rest, 0));
    if (this.byKeys) await this.page.keyboard.press('Enter');
    else await this.id(testId).click();
    this.pressedAt = Date.now();
    await expect.poll(() => this.words(), { timeout: 8_000, intervals: [20, 50] }).not.toBe(before);
    await this.settled();
  }

  /** The screen has come to rest: nobody types into one that is still changing. */
  private async settled(): Promise<void> {
    let before = '';
    for (let now = await this.words(); now !== before; now = await this.words()) {
      before = now;
      await this.page.waitForTimeout(90);
    }
  }

  /** An answer where one tap is enough. */
  async choose(name: string): Promise<void> {
    const choice = this.id(`choice-${name}`);
    await choice.waitFor();
    if (this.byKeys) return this.chooseNumber(((await choice.innerText()).match(/^\d/) ?? ['1'])[0]);
    // Taps in the first moment belong to the screen before.
    await this.page.waitForTimeout(400);
    await choice.click();
  }

  /** A digit marks an answer, and Enter gives it once a wrench acting as keyboard could not have meant it. */
  async chooseNumber(digit: string): Promise<void> {
    await this.page.waitForTimeout(PACE_MS);
    await this.page.keyboard.press(digit);
    await this.page.waitForTimeout(PACE_MS + 60);
    await this.page.keyboard.press('Enter');
  }

  /** Types a figure without recording it. */
  async type(figure: string): Promise<void> {
    for (const key of figure) {
      if (this.byKeys) await this.page.keyboard.press(key === '.' ? 'Period' : key, { delay: 60 });
      else
        await this.page.getByRole('button', { name: key === '.' ? 'Decimal point' : new RegExp(`^${key}$`) }).click();
    }
  }

  /** Types a figure and records it. */
  async record(figure: string): Promise<void> {
    await this.type(figure);
    await this.press('record');
  }

  /** "Pull bolt 7 to 30 N·m" and the like: the label of the bolt that is asked for. */
  async bolt(): Promise<string> {
    return /bolt (\d+)/.exec(await this.asks())?.[1] ?? '';
  }

  /** Records figures until a bolt of the pass is asked for. */
  async recordUntil(label: string, figure: (bolt: string) => string): Promise<void> {
    for (let bolt = await this.bolt(); bolt !== label; bolt = await this.bolt()) await this.record(figure(bolt));
  }

  /** Ticks every line of the screen. */
  async tickAll(): Promise<void> {
    await this.page.locator('[data-testid^=tick-]').first().waitFor();
    if (this.byKeys) {
      const lines = await this.page.locator('[data-testid^=tick-]').count();
      for (let line = 1; line <= lines; line += 1) await this.page.keyboard.press(String(line), { delay: 40 });
      return;
    }
    for (const tick of await this.page.locator('[data-testid^=tick-]').all()) await tick.click();
  }

  /** A tap on a head of the map. */
  async tapHead(label: string): Promise<void> {
    await this.page
      .getByRole('button', { name: new RegExp(`^Bolt ${label}\\b`) })
      .first()
      .click();
  }

  /** *Correct bolt …*: voids the last figure for the first usual reason and types it again (R10). */
  async correct(figure: string): Promise<void> {
    await this.open('correct');
    await this.choose('reason-1');
    await expect(this.id('instruction')).toContainText(/do not pull/i);
    await this.record(figure);
  }

  /** Puts in a new bolt where one is off: loosen, take out, look, prepare, fit (R2). */
  async replaceBolt(): Promise<void> {
    await this.page.getByRole('button', { name: /put in a new bolt/i }).waitFor();
    if (this.byKeys) {
      await this.chooseNumber('1');
      await this.settled();
    } else {
      await this.page.getByRole('button', { name: /put in a new bolt/i }).click();
      await this.press('record');
    }
    await this.press('record');
    await this.tickAll();
    await this.press('record');
    await this.prepare();
    await this.press('record');
  }

  /** A turn with its end torque and one pull, field by field. */
  async recordTurn(degrees: string, endTorque: string): Promise<void> {
    const fields = this.page.locator('.reading-box__field');
    const next = async (field: number): Promise<void> => {
      if (this.byKeys) await this.page.keyboard.press('Enter');
      else await fields.nth(field).click();
    };
    await this.type(degrees);
    await next(1);
    await this.type(endTorque);
    await next(2);
    await this.type('1');
    await this.press('record');
  }

  /** Signs what was walked. */
  async sign(meaning: string, pin: string): Promise<void> {
    await this.open('sign');
    await this.choose(meaning);
    await this.pinOf(null, pin);
    await this.id('countersign').waitFor();
  }

  /** Countersigns on this tablet, as somebody else. */
  async countersign(meaning: string, name: string, pin: string): Promise<void> {
    await this.open('countersign');
    await this.choose(meaning);
    await this.pinOf(name, pin);
    await this.id('leave').waitFor();
  }

  /** A button that is not the screen's main one: by tap, or reached by Tab and pressed by Enter. */
  private async open(testId: string): Promise<void> {
    if (!this.byKeys) return this.id(testId).click();
    await this.id(testId).focus();
    await this.page.keyboard.press('Enter');
  }

  private async pinOf(name: string | null, pin: string): Promise<void> {
    if (name !== null) {
      const who = this.page.getByRole('button', { name: new RegExp(name) });
      await who.waitFor();
      // Taps in the first moment belong to the screen before.
      await this.page.waitForTimeout(400);
      if (this.byKeys) await this.chooseNumber(((await who.innerText()).match(/^\d/) ?? ['1'])[0]);
      else await who.click();
    }
    await this.page
      .getByText(/of six digits/i)
      .first()
      .waitFor({ state: 'attached' });
    await this.typePin(pin);
  }
}
