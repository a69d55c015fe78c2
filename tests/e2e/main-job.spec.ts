import { expect, test } from '@playwright/test';
import { formatDate, formatLongMonth, formatMonth } from '@/lib/format';
import { type Account, chooseCsv, dayOf, linkIn, mailTo, month, openAs } from './steps';

/**
 * The whole way of a study, from an empty one to a sponsor who has read its dates: each test is one person's part and
 * begins where the one before left off.
 */
test.describe.configure({ mode: 'serial' });

const STUDY = '/studies/KLD-305';

const COORDINATOR: Account = {
  name: 'Elif Sandoval',
  email: 'elif.sandoval@sites.kalends.example',
  password: 'a quiet ledger under the lamp',
};

/** Two sites that opened months ago, one still to open. */
const OPENED = { first: dayOf(month(-4), 3), second: dayOf(month(-3), 12) };
const SITES = [
  ['code', 'name', 'city', 'country', 'earliest', 'likely', 'latest', 'activated', 'closed', 'cap'],
  ['901', 'Marrow Lane Hospital', 'Leeds', 'GB', '', '', '', OPENED.first, '', ''],
  ['902', 'Clínica da Ribeira', 'Porto', 'PT', '', '', '', OPENED.second, '', '60'],
  ['903', 'Szpital Nad Wartą', 'Poznań', 'PL', dayOf(month(3), 1), dayOf(month(3), 20), dayOf(month(5), 1), '', '', ''],
];

test('the trial manager uploads the site list, looks at it and accepts it', async ({ page }) => {
  await openAs(page, 'manager', `${STUDY}/sites`);
  await expect(page.getByText('No sites yet')).toBeVisible();
  await page.getByRole('link', { name: 'Upload a site list' }).click();
  await chooseCsv(page.getByLabel('Site list, as CSV'), 'sites.csv', SITES);

  await expect(page.getByRole('heading', { name: '3 sites in sites.csv' })).toBeVisible();
  await expect(page.getByText('2 open, 1 to open')).toBeVisible();
  const listed = page.getByRole('table', { name: 'Sites in the file' });
  await expect(listed.getByRole('row', { name: /901 Marrow Lane Hospital/ })).toContainText(formatDate(OPENED.first));

  await page.getByRole('button', { name: 'Add 3 sites' }).click();
  await expect(page.getByText('2 of 3 sites')).toBeVisible();
  await expect(page).toHaveURL(new RegExp(`${STUDY}/sites$`));
  await expect(page.getByRole('row', { name: /902 Clínica da Ribeira/ })).toContainText(formatDate(OPENED.second));
});

test('the trial manager invites a coordinator, who accepts and lands on the month sheet', async ({ page, browser }) => {
  await openAs(page, 'manager', `${STUDY}/people`);
  await page.getByLabel('Name').fill(COORDINATOR.name);
  await page.getByLabel('E-mail').fill(COORDINATOR.email);
  await page.getByLabel('Role').selectOption({ label: 'site coordinator' });
  await page.getByLabel('Site', { exact: true }).selectOption({ label: '901 Marrow Lane Hospital' });
  await page.getByRole('button', { name: 'Send the invitation' }).click();
  await expect(page.getByRole('table', { name: 'Open invitations' })).toContainText(COORDINATOR.email);

  const mail = await mailTo(COORDINATOR.email, /invit/i);
  expect(mail.text).toContain('Tomas Reyl');
  const invited = await browser.newContext();
  const theirs = await invited.newPage();
  await theirs.goto(linkIn(mail, '/invitation/'));
  await expect(
    theirs.getByText(`You are invited as site coordinator, with the address ${COORDINATOR.email}.`),
  ).toBeVisible();
  await expect(theirs.getByLabel('Your name, as others will see it')).toHaveValue(COORDINATOR.name);
  await theirs.getByLabel('Password').fill(COORDINATOR.password);
  await theirs.getByRole('button', { name: 'Accept and sign in' }).click();

  await expect(theirs).toHaveURL(new RegExp(`${STUDY}/log/901$`));
  await expect(theirs.getByRole('heading', { level: 1 })).toHaveText('Marrow Lane Hospital, Leeds');
  await invited.close();
});

test('the coordinator logs a month by keyboard, and a draft survives a reload', async ({ page }) => {
  const [last, named] = [month(), formatLongMonth(month())];
  await openAs(page, COORDINATOR, `${STUDY}/log`);
  await expect(page.getByText(named).first()).toBeVisible();
  const screened = page.getByLabel(`Screened in ${named}`);
  await screened.focus();
  for (const figure of ['6', '1', '4']) {
    await page.keyboard.type(figure);
    await page.keyboard.press('Tab');
  }
  await expect(page.getByLabel(`Events in ${named}`)).toBeFocused();

  await page.reload();
  await expect(page.getByText('Kept on this device, not sent').first()).toBeVisible();
  await expect(page.getByLabel(`Randomised in ${named}`)).toHaveValue('4');

  await page.getByLabel(`Events in ${named}`).focus();
  await page.keyboard.type('0');
  await page.keyboard.press('Tab');
  await page.keyboard.type('0');
  await page.keyboard.press('Enter');
  await expect(page.getByRole('button', { name: /^Save / })).toBeFocused();
  await page.keyboard.press('Enter');
  await expect(page.getByText(/Saved today at \d\d:\d\d\./)).toBeVisible();
  await expect(page.getByText(`${named}: 6 screened, 1 failed, 4 randomised, 0 events, 0 withdrawn.`)).toBeVisible();
  const row = page.getByRole('row', { name: new RegExp(`^${formatMonth(last)}`) });
  await expect(row).toContainText(COORDINATOR.name);
});

test('the coordinator corrects a figure with a reason, and the old one stays to be seen', async ({ page }) => {
  const [last, named] = [month(), formatLongMonth(month())];
  await openAs(page, COORDINATOR, `${STUDY}/log`);
  await page.getByRole('button', { name: `Correct ${named}` }).click();
  await page.getByLabel(`Randomised in ${named}`).fill('3');
  await page.getByRole('button', { name: 'Save correction' }).click();
  await expect(page.getByText('Choose a reason.')).toBeVisible();

  await page.getByLabel('Reason', { exact: true }).selectOption({ label: 'Typing error' });
  await page
    .getByLabel(`Why does ${named} change from 4 to 3 randomised?`)
    .fill('One patient was counted twice on the tally sheet.');
  await page.getByRole('button', { name: 'Save correction' }).click();

  const row = page.getByRole('row', { name: new RegExp(`^${formatMonth(last)}`) });
  await row.getByRole('button', { name: 'corrected once' }).click();
  await expect(page.getByText('Randomised: 4 became 3. Typing error:')).toBeVisible();
});
