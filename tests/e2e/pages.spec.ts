import AxeBuilder from '@axe-core/playwright';
import { expect, type Page, test } from '@playwright/test';
import { accountOf, fillSignIn, openAs, PEOPLE, type Person, ready } from './steps';

const STUDY = '/studies/KLD-301';
const OWN_SITE = '107';
const NOT_OPEN = 'This page is not open to you';
const PHONE = { width: 390, height: 844 };
const DESK = { width: 1280, height: 800 };

/** What each role opens, by hand: the table of permissions is not asked. */
const OPEN: Record<Person, string[]> = {
  statistician: [
    '/studies',
    `${STUDY}/plan`,
    `${STUDY}/plan/versions`,
    `${STUDY}/sites`,
    `${STUDY}/sites/upload`,
    `${STUDY}/log`,
    `${STUDY}/log/${OWN_SITE}`,
    `${STUDY}/data-cuts`,
    `${STUDY}/data-cuts/1`,
    `${STUDY}/data-cuts/upload`,
    `${STUDY}/forecasts`,
    `${STUDY}/forecasts/1`,
    `${STUDY}/forecasts/new`,
    `${STUDY}/timeline`,
    `${STUDY}/timeline/1`,
    `${STUDY}/alerts`,
    `${STUDY}/people`,
    `${STUDY}/audit`,
  ],
  manager: [
    '/studies',
    `${STUDY}/plan`,
    `${STUDY}/plan/versions`,
    `${STUDY}/sites`,
    `${STUDY}/sites/upload`,
    `${STUDY}/log`,
    `${STUDY}/log/${OWN_SITE}`,
    `${STUDY}/timeline`,
    `${STUDY}/people`,
  ],
  coordinator: [`${STUDY}/log/${OWN_SITE}`],
  sponsor: ['/studies', `${STUDY}/timeline`, `${STUDY}/timeline/1`],
  owner: ['/studies', '/organisation', `${STUDY}/people`, `${STUDY}/audit`],
};

const CLOSED: Record<Person, string[]> = {
  statistician: ['/organisation'],
  manager: [
    ...['data-cuts', 'data-cuts/1', 'data-cuts/upload', 'forecasts', 'forecasts/1', 'forecasts/new', 'alerts', 'audit'],
    '/organisation',
  ],
  coordinator: [
    ...['plan', 'plan/versions', 'sites', 'sites/upload', 'data-cuts', 'forecasts', 'timeline', 'alerts', 'people'],
    ...['audit', '/organisation'],
  ],
  sponsor: [
    'plan',
    'sites',
    'log',
    `log/${OWN_SITE}`,
    'data-cuts',
    'forecasts',
    'forecasts/1',
    'alerts',
    'people',
    'audit',
  ],
  owner: ['plan', 'sites', 'log', `log/${OWN_SITE}`, 'data-cuts', 'forecasts', 'timeline', 'timeline/1', 'alerts'],
};

/** The pages on which each role's work is done; looked at by axe, in light and dark. */
const MAIN: Record<Person, string[]> = {
  statistician: ['/studies', `${STUDY}/plan`, `${STUDY}/data-cuts/1`, `${STUDY}/forecasts`, `${STUDY}/alerts`],
  manager: [`${STUDY}/sites`, `${STUDY}/log`, `${STUDY}/people`],
  coordinator: [`${STUDY}/log/${OWN_SITE}`],
  sponsor: [`${STUDY}/timeline`],
  owner: ['/organisation', `${STUDY}/audit`],
};

/** Everything that a browser complains of: errors, and what the content security policy keeps out. */
function complaintsOf(page: Page): string[] {
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(`${page.url()}: ${message.text()}`);
  });
  page.on('pageerror', (error) => complaints.push(`${page.url()}: ${error.message}`));
  return complaints;
}

/** How much wider than the window the page is: above 0 it scrolls sideways. */
const overhang = (page: Page): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);

/** In the dark only the colours differ, so only they are looked at again. */
async function seriousFaults(page: Page, scheme: 'light' | 'dark' = 'light'): Promise<string[]> {
  await page.emulateMedia({ colorScheme: scheme });
  const axe = new AxeBuilder({ page });
  const { violations } = await (scheme === 'dark' ? axe.withRules('color-contrast') : axe).analyze();
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.target.join(' ')}`));
}

const heading = (page: Page) => page.getByRole('heading', { level: 1 });

for (const person of PEOPLE) {
  test(`every page of the ${person} opens without a complaint, wide and narrow, light and dark`, async ({ page }) => {
    test.slow();
    await page.setViewportSize(DESK);
    const complaints = complaintsOf(page);
    await openAs(page, person, OPEN[person][0]!);
    for (const path of OPEN[person]) {
      await page.goto(path);
      await ready(page);
      expect.soft(new URL(page.url()).pathname).toBe(path);
      await expect.soft(heading(page), path).toBeVisible();
      await expect.soft(heading(page), path).not.toHaveText(NOT_OPEN);
      expect.soft(await overhang(page), `${path} at ${DESK.width}`).toBeLessThanOrEqual(0);
      if (MAIN[person].includes(path)) {
        expect.soft(await seriousFaults(page, 'dark'), `${path}, dark`).toEqual([]);
        expect.soft(await seriousFaults(page), `${path}, light`).toEqual([]);
      }
      await page.setViewportSize(PHONE);
      await expect.soft.poll(() => overhang(page), `${path} at ${PHONE.width}`).toBeLessThanOrEqual(0);
      await page.setViewportSize(DESK);
    }
    expect(complaints).toEqual([]);
  });

  test(`what is not the ${person}’s says so`, async ({ page }) => {
    await openAs(page, person, OPEN[person][0]!);
    const [first, ...rest] = CLOSED[person].map((path) => (path.startsWith('/') ? path : `${STUDY}/${path}`));
    await page.goto(first!);
    await expect(heading(page)).toHaveText(NOT_OPEN);
    // The others by what the server sends, which is all that a browser would show.
    for (const path of rest)
      expect.soft(await (await page.request.get(path)).text(), path).toMatch(new RegExp(`<h1[^>]*>${NOT_OPEN}</h1>`));
  });
}

test('a stranger is led to sign in and then to where they were going', async ({ page }) => {
  await page.goto(`${STUDY}/forecasts`);
  await expect(page).toHaveURL(/\/sign-in\?next=/);
  await expect(heading(page)).toHaveText('Sign in');
  const { email, password } = await accountOf('statistician');
  await ready(page);
  await fillSignIn(page, { email, password: `${password} not` });
  await expect(page.getByRole('alert').filter({ hasText: 'Not signed in' })).toBeVisible();
  await fillSignIn(page, { email, password });
  await expect(page).toHaveURL(new RegExp(`${STUDY}/forecasts$`));
  await expect(page.getByRole('button', { name: 'Sign out' })).toBeVisible();
});

test('a coordinator’s own sheet opens, and another site’s is not there', async ({ page }) => {
  await openAs(page, 'coordinator', '/studies');
  await expect(page).toHaveURL(new RegExp(`${STUDY}/log/${OWN_SITE}$`));
  const other = await page.goto(`${STUDY}/log/101`);
  expect(other?.status()).toBe(404);
  await expect(page.getByRole('button', { name: /^Save / })).toHaveCount(0);
});

test('the figure is one tab stop, and arrow keys read its months', async ({ page }) => {
  await openAs(page, 'sponsor', `${STUDY}/timeline`);
  const figure = page.getByRole('figure').filter({ has: page.getByRole('slider') });
  const slider = figure.getByRole('slider', { name: 'Month read out of the figure' });
  const caption = figure.getByRole('status');
  await slider.focus();
  const before = { at: Number(await slider.getAttribute('aria-valuenow')), words: await caption.innerText() };
  await page.keyboard.press('ArrowRight');
  await expect(slider).toHaveAttribute('aria-valuenow', String(before.at + 1));
  await expect(caption).not.toHaveText(before.words);
  await page.keyboard.press('ArrowLeft');
  await expect(caption).toHaveText(before.words);
  await page.keyboard.press('Home');
  await expect(slider).toHaveAttribute('aria-valuenow', '0');
  await expect(caption).toContainText('observed');
  await page.keyboard.press('Tab');
  await expect(figure.locator(':focus')).toHaveCount(0);
  await page.keyboard.press('Shift+Tab');
  await expect(slider).toBeFocused();
  await page.keyboard.press('Shift+Tab');
  await expect(figure.locator(':focus')).toHaveCount(0);
});

test.describe('on a phone', () => {
  test.use({ viewport: PHONE, hasTouch: true });

  test('the coordinator’s month is five fields for a thumb', async ({ page }) => {
    await openAs(page, 'coordinator', `${STUDY}/log/${OWN_SITE}`);
    for (const name of ['Screened', 'Failed screening', 'Randomised', 'Events', 'Withdrawn']) {
      const field = page.getByRole('textbox', { name, exact: true });
      await expect(field).toBeVisible();
      expect((await field.boundingBox())?.height, name).toBeGreaterThanOrEqual(44);
    }
    expect(await seriousFaults(page)).toEqual([]);
  });
});
