import { expect, test } from '@playwright/test';
import { formatDate, formatLongMonth, formatMonth } from '@/lib/format';
import { type Account, accountOf, chooseCsv, dayOf, endOf, linkIn, mailTo, month, openAs, ready, today } from './steps';

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
  await ready(theirs);
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
  await ready(page);
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

const MILESTONES = [
  { name: 'Last patient in', count: '120', planned: endOf(month(16)) },
  { name: 'Interim analysis', count: '12', planned: endOf(month(14)) },
  { name: 'Final analysis', count: '40', planned: endOf(month(26)) },
];

test('the statistician sets up the plan, sees what it implies and saves it as version 1', async ({ page }) => {
  await openAs(page, 'statistician', `${STUDY}/plan`);
  const implied = page.getByRole('complementary', { name: 'What the plan implies' });
  const numbers = implied.getByRole('table', { name: 'What the plan alone implies, in numbers' });
  await expect(numbers).toHaveCount(0);

  await page.getByLabel('Patients to randomise').fill('120');
  await page.getByLabel('Mean rate of a site', { exact: true }).fill('3');
  await page.getByLabel('Spread between sites (CV)').fill('0.5');
  const rows = page.locator('#milestones').getByRole('listitem');
  for (const [place, { name, count, planned }] of MILESTONES.entries()) {
    const row = rows.nth(place);
    await expect(row.getByLabel('Name')).toHaveValue(name);
    await row.getByLabel('Count').fill(count);
    await row.getByLabel('Planned for').fill(planned);
  }
  await page.getByRole('button', { name: 'Work it out from the protocol' }).click();
  await page.getByLabel('Control group’s median').fill('20');
  await page.getByLabel('Hazard ratio').fill('0.7');
  // The median of the mixture, by hand: 20 · log2(1/u) with u + u^0.7 = 1.
  await page.getByRole('button', { name: 'Use 23.8 months' }).click();
  await expect(page.getByLabel('Median time to event')).toHaveValue('23.8');
  await page.getByLabel('Loss to follow-up').fill('0.5');

  await expect(numbers.getByRole('row', { name: /Last patient in/ })).toContainText(/[A-Z][a-z]{2} .*20\d\d/);
  await expect(numbers.getByRole('row', { name: /Final analysis/ })).toContainText(/%/);
  await expect(implied.getByRole('figure')).toBeVisible();
  await page.getByRole('button', { name: 'Save the plan' }).first().click();
  await expect(page.getByText('The plan is saved as version 1.')).toBeVisible();
  await expect(page.getByText(/^Version 1, saved .* by Imke Calloway, stands/)).toBeVisible();
});

test('the statistician asks that the sponsor be told when the last patient nears', async ({ page }) => {
  await openAs(page, 'statistician', `${STUDY}/alerts`);
  await expect(page.getByText('No rule yet')).toBeVisible();
  await page.getByLabel('Milestone').selectOption({ label: 'Last patient in' });
  await page.getByLabel('Speaks when').selectOption({ label: 'it nears' });
  await page.getByLabel('Within').fill('104');
  await page.getByLabel('With a chance of at least').fill('5');
  await expect(page.getByLabel('Every sponsor viewer')).toBeChecked();
  await page.getByRole('button', { name: 'Add the rule' }).click();
  const rules = page.getByRole('table', { name: 'Alert rules of the study' });
  await expect(rules.getByRole('row', { name: /last patient in/i })).toContainText('every sponsor viewer');
});

/** Four of the last month where the log has three, and earlier ones of months that nobody logged. */
const CUTOFF = endOf(month());
const HEAD = ['subject', 'site', 'randomised on', 'status', 'status on'];
const SUBJECTS = [
  ['901-01', '901', dayOf(month(-2), 4), 'event', dayOf(month(-1), 22)],
  ['901-02', '901', dayOf(month(-2), 11), 'at-risk', CUTOFF],
  ['901-03', '901', dayOf(month(-1), 9), 'at-risk', CUTOFF],
  ['901-04', '901', dayOf(month(), 2), 'at-risk', CUTOFF],
  ['901-05', '901', dayOf(month(), 9), 'at-risk', CUTOFF],
  ['901-06', '901', dayOf(month(), 16), 'at-risk', CUTOFF],
  ['901-07', '901', dayOf(month(), 23), 'at-risk', CUTOFF],
  ['902-01', '902', dayOf(month(-2), 17), 'withdrawn', dayOf(month(), 5)],
  ['902-02', '902', dayOf(month(-1), 6), 'event', dayOf(month(), 19)],
  ['902-03', '902', dayOf(month(-1), 25), 'at-risk', CUTOFF],
  ['902-04', '902', dayOf(month(), 12), 'at-risk', CUTOFF],
];
const DIFFERENCE = 'Patient 901-07 was randomised late on the 23rd; the site counts them with the month after.';

test('a listing with a treatment arm is refused; the blinded one is looked at and accepted', async ({ page }) => {
  await openAs(page, 'statistician', `${STUDY}/data-cuts`);
  await page.getByRole('link', { name: 'Upload a data cut' }).click();
  const file = page.getByLabel('Subject listing, as CSV');
  await chooseCsv(file, 'with-arm.csv', [
    [...HEAD, 'ARM'],
    ...SUBJECTS.map((subject, place) => [...subject, place % 2 ? 'A' : 'B']),
  ]);
  const refusal = page.getByRole('alert').filter({ hasText: 'with-arm.csv was not taken. Nothing is stored.' });
  await expect(refusal).toContainText('“ARM”, carries treatment.');
  await expect(refusal).toContainText('This product is blinded: no treatment arm is stored, asked for or shown.');

  await chooseCsv(file, 'listing.csv', [HEAD, ...SUBJECTS]);
  await expect(page.getByRole('heading', { name: '11 subjects in listing.csv' })).toBeVisible();
  await expect(refusal).toHaveCount(0);
  const differing = page.getByRole('table', { name: 'Sites where listing and log differ' });
  await expect(differing.getByRole('row')).toHaveCount(2);
  await expect(differing.getByRole('row', { name: /^901/ }).getByRole('cell')).toHaveText(['7', '3', '3', '+1']);

  await page.getByRole('button', { name: 'Accept the data cut' }).click();
  await expect(page.getByText('Say in a note why they differ.')).toBeVisible();
  await page.getByLabel('Why listing and log differ').fill(DIFFERENCE);
  await page.getByRole('button', { name: 'Accept the data cut' }).click();
  await expect(page).toHaveURL(new RegExp(`${STUDY}/data-cuts/1$`));
  await expect(page.getByText('Note of Imke Calloway')).toBeVisible();
  await expect(page.getByText(DIFFERENCE)).toBeVisible();
});

const NOTE = 'First forecast. Two sites are open and the third follows in spring; the plan still weighs.';

test('the statistician runs a forecast, watches it and publishes it with a note', async ({ page }) => {
  await openAs(page, 'statistician', `${STUDY}/data-cuts/1`);
  await page.getByRole('link', { name: 'Run a forecast' }).click();
  await expect(page.getByLabel('Data cut')).toHaveValue('1');
  // Enough draws to be seen at work.
  await page.getByLabel('Draws').fill('100000');
  await page.getByRole('button', { name: 'Run the forecast' }).click();
  await expect(page.getByRole('progressbar', { name: 'Drawing 100,000 futures' })).toBeVisible();
  await expect(page.getByRole('slider', { name: 'Month read out of the figure' })).toBeVisible({ timeout: 30_000 });
  await expect(page.getByRole('progressbar')).toHaveCount(0);
  await expect(page.getByRole('heading', { name: 'Cautions' })).toBeVisible();
  await expect(page.getByText('A forecast is not a decision').first()).toBeVisible();

  await page.getByRole('link', { name: 'Publish to sponsor' }).click();
  await page.getByLabel('Note for the readers').fill(NOTE);
  await page.getByRole('button', { name: 'Publish to sponsor' }).click();
  const asked = page.getByRole('dialog', { name: 'Publish to 3 readers?' });
  await expect(asked).toContainText('1 sponsor viewer');
  await expect(asked).toContainText('Last patient in');
  await asked.getByRole('button', { name: 'Publish to sponsor' }).click();
  await expect(page).toHaveURL(new RegExp(`${STUDY}/timeline$`));
  await expect(page.getByText('Marcus Obanye: not yet')).toBeVisible();
});

test('the sponsor is told by mail, reads the timeline and acknowledges its cautions', async ({ page }) => {
  const { email } = await accountOf('sponsor');
  const mail = await mailTo(email, /^KLD-305: last patient in nears/i);
  const link = new URL(linkIn(mail, `${STUDY}/timeline`));
  expect(link.origin).toBe(new URL(process.env.KALENDS_URL ?? '').origin);
  await openAs(page, 'sponsor', link.pathname);

  await expect(page.getByText(/^Publication 1, .*by Imke Calloway, protocol statistician/)).toBeVisible();
  const entry = page.getByRole('listitem').filter({ hasText: 'Last patient in' }).first();
  // Range first, then the median, with what it is a range of.
  await expect(entry).toContainText(/[A-Z][a-z]{2}( 20\d\d)? to [A-Z][a-z]{2} 20\d\d.*80\s%.*median/is);
  await expect(page.getByText(NOTE)).toBeVisible();
  await expect(page.getByRole('heading', { name: /cautions?$/ })).toBeVisible();
  await page.getByRole('button', { name: 'Acknowledge cautions' }).click();
  await expect(page.getByText(`Acknowledged by you on ${formatDate(today())}.`)).toBeVisible();
  await expect(page.getByRole('button', { name: 'Acknowledge cautions' })).toHaveCount(0);
});

test('the owner finds people and the whole way in the trail, and no forecast', async ({ page }) => {
  await openAs(page, 'owner', '/organisation');
  const row = page.getByRole('row', { name: /KLD-305/ });
  await row.getByRole('link', { name: 'People' }).click();
  const people = page.getByRole('table', { name: 'People with a role in the study' });
  await expect(people.getByRole('row', { name: new RegExp(COORDINATOR.name) })).toContainText('site 901');

  await page.goto('/organisation');
  await row.getByRole('link', { name: 'Audit' }).click();
  const trail = page.getByRole('table', { name: 'The study’s trail' });
  const acts = [
    ['Tomas Reyl', 'Sites: add list'],
    ['Tomas Reyl', 'People: invite'],
    [COORDINATOR.name, 'People: join'],
    [COORDINATOR.name, 'Site log: log'],
    [COORDINATOR.name, 'Site log: correct'],
    ['Imke Calloway', 'Plan: save version'],
    ['Imke Calloway', 'Alerts: add rule'],
    ['Imke Calloway', 'Data cuts: accept'],
    ['Imke Calloway', 'Forecasts: request'],
    ['Imke Calloway', 'Publications: publish'],
    ['Marcus Obanye', 'Publications: acknowledge'],
  ] as const;
  for (const [who, what] of acts)
    await expect
      .soft(trail.getByRole('row').filter({ hasText: who }).filter({ hasText: what }), what)
      .not.toHaveCount(0);
  await expect(trail).toContainText('One patient was counted twice on the tally sheet.');

  await page.goto(`${STUDY}/forecasts`);
  await expect(page.getByRole('heading', { level: 1 })).toHaveText('This page is not open to you');
});
