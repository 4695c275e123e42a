import { AxeBuilder } from '@axe-core/playwright';
import type { BrowserContext, Page } from 'playwright-core';
import { expect } from 'vitest';
import { demoPassword } from '../support/running-server';

/** Signs in by the form and waits for the sheet that follows. */
export async function signIn(page: Page, address: string, account: string): Promise<void> {
  await page.goto(`${address}/sign-in`);
  await page.getByLabel('E-mail').fill(`${account}@keepstep.example`);
  await page.getByLabel('Password').fill(demoPassword);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}

/** A page of its own for one more person, with cookies of its own. */
export async function anotherPerson(context: BrowserContext, address: string, account: string): Promise<Page> {
  const browser = context.browser();
  const own = browser ? await browser.newContext({ viewport: context.pages()[0]?.viewportSize() ?? null }) : context;
  const page = await own.newPage();
  await signIn(page, address, account);
  return page;
}

export async function signOut(page: Page): Promise<void> {
  await page.locator('.who').getByRole('button').last().click();
  await page.getByText('Sign out').click();
  await page.waitForURL(/sign-in/);
}

/** No violation of WCAG 2.0 to 2.2 A and AA, and nothing wider than the window. */
export async function expectSound(page: Page, what: string): Promise<void> {
  // From the top: a field that is half scrolled under the sticky bar would count as too small a target.
  await page.evaluate('scrollTo(0, 0)');
  const { violations } = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
    .analyze();
  const found = violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`);
  expect(found, `axe on ${what}`).toEqual([]);
  const excess = await page.evaluate<number>('document.documentElement.scrollWidth - innerWidth');
  expect(excess, `pixels that ${what} is too wide`).toBeLessThanOrEqual(0);
}

/** Types into the field with this number on the sheet and leaves it. */
export async function type(page: Page, number: string, text: string): Promise<void> {
  const field = page.locator(`[id="field-${number}"]`);
  await field.fill(text);
  await field.blur();
}

/** The numbers of one row of a loop's table, a stage each: the sheet's minus, thin spaces and exponents read back. */
export async function rowNumbers(page: Page, loop: string, group: string, label: string): Promise<number[]> {
  const section = page
    .getByRole('table', { name: loop, exact: true })
    .locator('tbody')
    .filter({ has: page.getByRole('rowheader', { name: group, exact: true }) });
  const cells = section
    .locator('tr')
    .filter({ has: page.getByRole('rowheader', { name: label }) })
    .locator('td.n');
  return (await cells.allTextContents()).map(readNumber);
}

/** Mantissas and right shifts of one row of words, shown as M·2^(−s). */
export async function rowWords(
  page: Page,
  loop: string,
  label: string,
): Promise<{ mantissa: number; shift: number }[]> {
  const section = page
    .getByRole('table', { name: loop, exact: true })
    .locator('tbody')
    .filter({ has: page.getByRole('rowheader', { name: 'Words', exact: true }) });
  const cells = section
    .locator('tr')
    .filter({ has: page.getByRole('rowheader', { name: label, exact: true }) })
    .locator('td.n');
  return (await cells.allTextContents()).map((text) => {
    const [mantissa = '', power = '0'] = plain(text).split('·2');
    return { mantissa: Number(mantissa), shift: 0 - Number(power) };
  });
}

const plain = (text: string) => text.replaceAll('−', '-').replace(/[\s\u202f]/g, '');
const readNumber = (text: string) => Number(plain(text));
