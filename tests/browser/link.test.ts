import { readFile } from 'node:fs/promises';
import type { BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openBrowser } from '../support/browser';
import { demoPassword, startServer } from '../support/running-server';
import { byHand, detectorGain, gainsOfWords, nearestWord, noiseBandwidthBySum, wantedGains } from './independent-loop';
import { expectSound, rowNumbers, rowWords, signIn, signOut, type } from './sheet';

/** Receiver phase-noise tolerance of satellite broadcast, ETSI EN 302 307-1 annex (from memory): Hz, dBc/Hz. */
const mask = [
  ['100 Hz', '-25'],
  ['1 kHz', '-50'],
  ['10 kHz', '-73'],
  ['100 kHz', '-93'],
  ['1 MHz', '-103'],
  ['10 MHz', '-114'],
] as const;

describe.each([
  { width: 1440, height: 900, version: '9.1.0' },
  { width: 390, height: 844, version: '9.2.0' },
])('a published link, from description to frozen header and verdict, at $width px', ({ width, height, version }) => {
  const name = `Link 27.5, ${width}`;
  let server: Awaited<ReturnType<typeof startServer>>;
  let browser: { context: BrowserContext; close(): Promise<void> };
  let page: Page;
  let header = '';

  beforeAll(async () => {
    server = await startServer();
    browser = await openBrowser(width, height);
    page = await browser.context.newPage();
  });
  afterAll(async () => {
    await browser?.close();
    await server?.stop();
  });

  it('signs in and keeps the session over a reload', async () => {
    await page.goto(server.address);
    await page.waitForURL(/sign-in/);
    await expectSound(page, 'sign-in');
    await signIn(page, server.address, 'engineer');
    await page.getByRole('link', { name: 'Transponder 17, QPSK 27.5', exact: true }).waitFor();
    await expectSound(page, 'plans');
    await page.reload();
    await page.getByRole('link', { name: 'Transponder 17, QPSK 27.5', exact: true }).waitFor();
  });

  it('renews an access token that has run out without asking anybody', async () => {
    const renewed = page.waitForResponse((answer) => answer.url().endsWith('/session/refresh') && answer.ok());
    let refused = 0;
    await page.route(/\/api\/v1\/targets/, async (route) => {
      refused += 1;
      const problem = JSON.stringify({
        type: '/problems/unauthenticated',
        title: 'Sign in again.',
        status: 401,
        faults: [],
      });
      if (refused > 1) await route.continue();
      else await route.fulfill({ status: 401, contentType: 'application/problem+json', body: problem });
    });
    await page.getByRole('link', { name: 'Targets', exact: true }).click();
    await renewed;
    await page.getByRole('link', { name: 'Corvid C2' }).first().waitFor();
    await expectSound(page, 'targets');
    await page.getByRole('link', { name: 'Corvid C2' }).first().click();
    await page.getByRole('heading', { name: 'Registers' }).waitFor();
    await expectSound(page, 'a target');
    await page.unroute(/\/api\/v1\/targets/);
  });

  it('takes the description, with units as people type them', async () => {
    await page.goto(`${server.address}/plans/new`);
    await page.getByLabel('Name', { exact: true }).fill(name);
    await page.getByLabel('Target').selectOption('corvid-c2');
    await type(page, '1.2', '27.5 MBd');
    await type(page, '1.4', '0.35');
    await type(page, '1.5', '10');
    await page.getByRole('button', { name: 'Add a carrier loop' }).click();
    await page.getByRole('button', { name: 'Add a stage' }).first().click();
    await type(page, '2.4', '3');
    await page.getByLabel('BnT, acquire').first().fill('0.01');
    await page.getByLabel('BnT, track').first().fill('0.004');
    await page.getByLabel('Until, acquire').first().fill('8000');
    await type(page, '2.15', '8');
    await type(page, '4.1', '1.55 GHz');
    await type(page, '4.2', '±25 ppm');
    await page.getByRole('button', { name: 'Add a table' }).click();
    for (const [index, [offset, level]] of mask.entries()) {
      if ((await page.getByLabel(`Offset, row ${index + 1}`).count()) === 0) {
        await page.getByRole('button', { name: 'Add a point' }).click();
      }
      const row = page.getByLabel(`Offset, row ${index + 1}`);
      await row.fill(offset);
      await row.blur();
      const levels = page.getByLabel(/^Level/);
      await levels.nth(index).fill(level);
      await levels.nth(index).blur();
    }
    await page.getByRole('table', { name: 'Carrier loop', exact: true }).waitFor();
    await page.getByText('up to date').waitFor();
  });

  it('shows the gains, words and bandwidth that hand and brute force give', async () => {
    const gains = [byHand.acquire, byHand.track];
    const group = 'Gains of the loop';
    const shown = (values: number[], digits: number) => values.map((value) => Number(value.toPrecision(digits)));
    expect(await rowNumbers(page, 'Carrier loop', group, 'Proportional g1')).toEqual(
      shown(
        gains.map(({ g1 }) => g1),
        5,
      ),
    );
    expect(await rowNumbers(page, 'Carrier loop', group, 'Integral g2')).toEqual(
      shown(
        gains.map(({ g2 }) => g2),
        5,
      ),
    );

    const wanted = gains.map(wantedGains);
    const proportional = wanted.map((gain) => nearestWord(gain.proportional));
    const integral = wanted.map((gain) => nearestWord(gain.integral));
    expect(await rowWords(page, 'Carrier loop', 'Proportional')).toEqual(proportional);
    expect(await rowWords(page, 'Carrier loop', 'Integral')).toEqual(integral);

    const exact = gains.map((pair) => Number(noiseBandwidthBySum(pair, 3).toFixed(6)));
    expect(await rowNumbers(page, 'Carrier loop', 'What the loop does, delay included', 'Noise bandwidth BnT')).toEqual(
      exact,
    );
    const effective = proportional.map((p, stage) => gainsOfWords(p, integral[stage]!));
    expect(await rowNumbers(page, 'Carrier loop', 'Words', 'BnT from words')).toEqual(
      effective.map((pair) => Number(noiseBandwidthBySum(pair, 3).toFixed(6))),
    );
    expect(await rowNumbers(page, 'Carrier loop, budget and acquisition', 'Detector at lock', 'Slope Kd')).toEqual([
      Number(detectorGain.toFixed(4)),
    ]);
  });

  it('refuses a wrong value at its field and keeps the older numbers marked as out of date', async () => {
    await type(page, '1.4', '1.35');
    await page.getByText('Roll-off', { exact: false }).and(page.locator('.err')).waitFor();
    expect(await page.locator('[id="field-1.4"]').getAttribute('aria-invalid')).toBe('true');
    await page.getByText('out of date').first().waitFor();
    await expectSound(page, 'plan with a wrong field');
    await type(page, '1.4', '0.35');
    await page.getByText('up to date').waitFor();
  });

  it('saves a revision and hands out config.yaml and config.h', async () => {
    await page.getByRole('button', { name: 'Create the plan' }).click();
    await page.waitForURL(/\/plans\/\d+$/);
    await page.getByRole('button', { name: 'Save as r1' }).click();
    await page.getByLabel('Note').fill('First values');
    await page.getByRole('dialog').getByRole('button', { name: 'Save as r1' }).click();
    await page.getByRole('button', { name: 'Download config.h' }).waitFor();
    await expectSound(page, 'plan with a revision');
    header = await downloaded(page, 'config.h');
    expect(header).toMatch(/CARRIER_TRACK_PROPORTIONAL_MANTISSA\s+.*1276/);
    expect(header).toMatch(/CARRIER_TRACK_INTEGRAL_MANTISSA\s+.*1742/);
    expect(await downloaded(page, 'config.yaml')).toContain('mantissa: 1582');
  });

  it('freezes a release with it, and serves the file by target and version', async () => {
    await signOut(page);
    await signIn(page, server.address, 'release');
    await page.goto(`${server.address}/releases`);
    await page.getByRole('button', { name: 'New release' }).click();
    await page.getByLabel('Target').selectOption('corvid-c2');
    await page.getByLabel('Version').fill(version);
    await page.getByRole('button', { name: `Make ${version}` }).click();
    await page.waitForURL(/\/releases\/\d+$/);
    await page.getByRole('button', { name: 'Add a revision' }).click();
    await page.getByLabel('Plan', { exact: true }).selectOption({ label: name });
    await page.getByLabel('Slot').fill('dl_link');
    await page.getByRole('button', { name: 'Put r1 into dl_link' }).click();
    await page.getByRole('rowheader', { name: 'dl_link' }).waitFor();
    await expectSound(page, 'release as a draft');
    await page.getByRole('button', { name: `Freeze ${version}` }).click();
    const dialog = page.getByRole('dialog');
    expect(await dialog.getByRole('button', { name: `Freeze ${version}` }).isDisabled()).toBe(true);
    await dialog.getByLabel(`Type ${version}`).fill(version);
    await expectSound(page, 'the freeze dialog');
    await dialog.getByRole('button', { name: `Freeze ${version}` }).click();
    await page.getByText('dl_link.config.h').first().waitFor();
    await expectSound(page, 'release, frozen');

    const frozen = await fetchFrozen(server.address, version, 'dl_link.config.h');
    expect(frozen).toContain(version);
    expect(frozen).toMatch(new RegExp(`_RELEASE\\s+"${version}"`));
    expect(fromWordsOn(frozen)).toBe(fromWordsOn(header));
  });

  it('replays the revision over carrier offsets and gives a verdict and the same digest twice', async () => {
    await signOut(page);
    await signIn(page, server.address, 'tester');
    const digests: string[] = [];
    for (const run of [1, 2]) {
      await page.goto(`${server.address}/tolerance/new`);
      await page.getByLabel('Plan', { exact: true }).selectOption({ label: name });
      await type(page, '2.1', '-77.5 kHz');
      await type(page, '2.2', '77.5 kHz');
      await type(page, '2.3', '5');
      await type(page, '3.1', '10');
      await type(page, '3.2', '12000');
      await type(page, '3.3', '60');
      await type(page, '3.4', '65');
      await type(page, '4.1', '0.9');
      if (run === 1) await expectSound(page, 'a new replay');
      await page.getByRole('button', { name: 'Start the replay' }).click();
      await page.waitForURL(/\/replays\/\d+$/);
      await page.getByText('Locks over the whole range').waitFor({ timeout: 120_000 });
      if (run === 1) await expectSound(page, 'a finished replay');
      // Sixty of sixty at 95 %: the exact lower limit is 0.025^(1/60) = 0.9404.
      await page.getByText('0.9404').first().waitFor();
      digests.push(
        (await page
          .locator('code, .code')
          .filter({ hasText: /^[0-9a-f]{64}$/ })
          .first()
          .textContent()) ?? '',
      );
    }
    expect(digests[0]).toMatch(/^[0-9a-f]{64}$/);
    expect(digests[1]).toBe(digests[0]);
  });
});

async function downloaded(page: Page, file: string): Promise<string> {
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: `Download ${file}` }).click(),
  ]);
  return readFile(await download.path(), 'utf8');
}

/** As a build machine does: a token, then the path by target and version. */
async function fetchFrozen(address: string, version: string, file: string): Promise<string> {
  const session = await fetch(`${address}/api/v1/session`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ email: 'viewer@keepstep.example', password: demoPassword }),
  });
  const { accessToken } = (await session.json()) as { accessToken: string };
  const answer = await fetch(`${address}/api/v1/targets/corvid-c2/releases/${version}/files/${file}`, {
    headers: { authorization: `Bearer ${accessToken}` },
  });
  expect(answer.status).toBe(200);
  return answer.text();
}

/** What a frozen file shares with the revision's, which names no release in its head. */
const fromWordsOn = (text: string) => text.slice(text.indexOf('/* Words of the plan'));
