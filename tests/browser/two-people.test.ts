import { readFile } from 'node:fs/promises';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openBrowser } from '../support/browser';
import { demoPassword, startServer } from '../support/running-server';
import { expectSound, signIn, type } from './sheet';

const field = (page: Page, number: string) => page.locator(`[id="field-${number}"]`);

describe('drafts, conflicts and other beginnings of a plan', () => {
  let server: Awaited<ReturnType<typeof startServer>>;
  let ines: Awaited<ReturnType<typeof openBrowser>>;
  let tamsin: Awaited<ReturnType<typeof openBrowser>>;
  let hers: Page;
  let theirs: Page;

  beforeAll(async () => {
    server = await startServer();
    await inviteEngineer(server.address, 'tamsin');
    [ines, tamsin] = await Promise.all([openBrowser(1440, 900), openBrowser(1440, 900)]);
    [hers, theirs] = await Promise.all([ines.context.newPage(), tamsin.context.newPage()]);
    await signIn(hers, server.address, 'engineer');
    await signIn(theirs, server.address, 'tamsin');
  });
  afterAll(async () => {
    await Promise.all([ines?.close(), tamsin?.close()]);
    await server?.stop();
  });

  it('keeps a draft over a reload, the text of a wrong field too', async () => {
    await hers.goto(`${server.address}/plans/1`);
    await type(hers, '2.4', '4');
    await hers.getByText('was 3 updates in r3').waitFor();
    const kept = hers.waitForResponse((answer) => {
      const request = answer.request();
      return request.url().endsWith('/draft') && (request.postData() ?? '').includes('1.35') && answer.ok();
    });
    await type(hers, '1.4', '1.35');
    await kept;
    await hers.reload();
    await hers.getByText('was 3 updates in r3').waitFor();
    expect(await field(hers, '2.4').inputValue()).toBe('4');
    expect(await field(hers, '1.4').inputValue()).toBe('1.35');
    await type(hers, '1.4', '0.35');
  });

  it('refuses the second of two who save one plan, loses nothing typed and lets them go on', async () => {
    await theirs.goto(`${server.address}/plans/1`);
    await type(theirs, '2.4', '6');
    await type(theirs, '2.13', '14');
    await save(hers, 'r4');
    await hers.getByText('r4', { exact: true }).first().waitFor();

    await theirs.getByRole('button', { name: 'Save as r4' }).click();
    await theirs.getByRole('dialog').getByRole('button', { name: 'Save as r4' }).click();
    await theirs.getByRole('heading', { name: /saved r4 while you were typing/ }).waitFor();
    await expectSound(theirs, 'a conflict');
    expect(await field(theirs, '2.4').inputValue()).toBe('6');
    expect(await field(theirs, '2.13').inputValue()).toBe('14');

    await theirs.getByRole('button', { name: 'Keep all of mine' }).click();
    await theirs.getByRole('button', { name: /^Go on from r4/ }).click();
    expect(await field(theirs, '2.4').inputValue()).toBe('6');
    await save(theirs, 'r5');
    await theirs.getByRole('rowheader', { name: 'r5' }).waitFor();
  });

  it('types a remedy into the form and takes it back', async () => {
    await hers.goto(`${server.address}/plans/1`);
    await hers.getByRole('button', { name: 'Set 2.5 to exact' }).click();
    expect(await hers.getByRole('radio', { name: 'exact' }).first().isChecked()).toBe(true);
    await hers.getByRole('button', { name: 'Take it back' }).click();
    expect(await hers.getByRole('radio', { name: 'nominal' }).first().isChecked()).toBe(true);
  });

  it('hands out the files of an earlier revision as they were', async () => {
    await hers.getByLabel('Files of an earlier revision').selectOption('r1');
    await hers.getByText('Files of r1.').waitFor();
    const [download] = await Promise.all([
      hers.waitForEvent('download'),
      hers.getByRole('table', { name: 'Files of r1' }).getByRole('button', { name: 'Download config.h' }).click(),
    ]);
    expect(await readFile(await download.path(), 'utf8')).toMatch(/_REVISION\s+UINT32_C\(1\)/);
    await expectSound(hers, 'the files of an earlier revision');
  });

  it('begins a plan from a copy and from a YAML file, and says what in a file cannot be read', async () => {
    await hers.goto(`${server.address}/plans/new?copy=1`);
    await hers.getByRole('table', { name: 'Carrier loop', exact: true }).waitFor();
    expect(await field(hers, '1.2').inputValue()).toBe('27.5');

    await hers.goto(`${server.address}/plans`);
    await chooseFile(hers, 'good.yaml', yamlPlan('10 dB'));
    await hers.waitForURL(/\/plans\/new/);
    await hers.getByRole('table', { name: 'Carrier loop', exact: true }).waitFor();
    expect(await field(hers, '1.2').inputValue()).toBe('64');

    await hers.goto(`${server.address}/plans`);
    await chooseFile(hers, 'wrong.yaml', yamlPlan('10 kHz'));
    await hers.getByText(/1\.5/).first().waitFor();
    await expectSound(hers, 'a refused YAML file');
  });

  it('lets a viewer read the sheet and change nothing', async () => {
    await theirs.context().clearCookies();
    await signIn(theirs, server.address, 'viewer');
    await theirs.goto(`${server.address}/plans/1`);
    await theirs.getByRole('table', { name: 'Carrier loop', exact: true }).waitFor();
    expect(await field(theirs, '2.4').isDisabled()).toBe(true);
    await expectSound(theirs, 'a plan as a viewer reads it');
  });
});

const yamlPlan = (esN0: string) => `name: Beacon from a file
target: corvid-c2
signal:
  modulation: BPSK
  symbolRateBd: 64 kBd
  esN0Db: ${esN0}
carrier:
  detector: costas
  stages:
    - name: track
      noiseBandwidth: 0.005
`;

async function chooseFile(page: Page, name: string, text: string): Promise<void> {
  const file = { name, mimeType: 'application/yaml', buffer: Buffer.from(text) };
  await page.locator('input[type=file]').first().setInputFiles(file);
}

async function save(page: Page, revision: string): Promise<void> {
  await page.getByRole('button', { name: `Save as ${revision}` }).click();
  await page
    .getByRole('dialog')
    .getByRole('button', { name: `Save as ${revision}` })
    .click();
  await page.getByRole('dialog').waitFor({ state: 'detached' });
}

/** A second engineer, by the one-time link that an admin hands out. */
async function inviteEngineer(address: string, name: string): Promise<void> {
  const post = (path: string, body: object, token?: string) =>
    fetch(`${address}/api/v1${path}`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', ...(token ? { authorization: `Bearer ${token}` } : {}) },
      body: JSON.stringify(body),
    });
  const session = await post('/session', { email: 'admin@keepstep.example', password: demoPassword });
  const { accessToken } = (await session.json()) as { accessToken: string };
  const email = `${name}@keepstep.example`;
  const invited = await post('/people', { email, name: 'Tamsin Okell', role: 'engineer' }, accessToken);
  const { link } = (await invited.json()) as { link: string };
  const done = await post('/password', { token: link.split('/').at(-1), password: demoPassword });
  expect(done.status).toBe(204);
}
