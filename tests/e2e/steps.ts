import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { expect, type Locator, type Page } from '@playwright/test';
import { type ParsedMail, simpleParser } from 'mailparser';
import { addMonths, lastEndedMonth, monthEnd } from '@/lib/dates';

/** The people of the demonstration, by what they do. */
const NAMES = {
  statistician: 'Imke Calloway',
  manager: 'Tomas Reyl',
  coordinator: 'Halina Wójt',
  sponsor: 'Marcus Obanye',
  owner: 'Lene Larkfield',
} as const;
export type Person = keyof typeof NAMES;
export const PEOPLE = Object.keys(NAMES) as Person[];

export interface Account {
  name: string;
  email: string;
  password: string;
}

const dataFolder = (): string => {
  const folder = process.env.KALENDS_DATA;
  if (!folder) throw new Error('KALENDS_DATA says where the accounts and the mailbox of the product under test are.');
  return folder;
};

export async function accountOf(person: Person): Promise<Account> {
  const accounts = JSON.parse(await readFile(join(dataFolder(), 'demo-accounts.json'), 'utf8')) as Account[];
  const found = accounts.find(({ name }) => name === NAMES[person]);
  if (!found) throw new Error(`The demonstration has no account of ${NAMES[person]}.`);
  return found;
}

/** Fills in the form on show. Where it leads is for the caller to expect. */
export async function fillSignIn(page: Page, { email, password }: Pick<Account, 'email' | 'password'>): Promise<void> {
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

/** Waits until React has taken the page over: what is typed or clicked before that is lost. */
export async function ready(page: Page): Promise<void> {
  await page.waitForFunction(() =>
    Object.keys(document.querySelector('main') ?? {}).some((key) => key.startsWith('__reactFiber')),
  );
}

/** Signs in on the way to a page, as somebody does who opens a bookmark. */
export async function openAs(page: Page, who: Person | Account, path: string): Promise<void> {
  await page.goto(`/sign-in?next=${encodeURIComponent(path)}`);
  await ready(page);
  await fillSignIn(page, typeof who === 'string' ? await accountOf(who) : who);
  await expect(page.getByRole('button', { name: 'Sign out' })).toBeVisible();
  await ready(page);
}

interface MailboxLine {
  id: string;
  to: string;
  subject: string;
}

/** Waits for a mail to somebody, as they would, and reads it. The newest of those that match. */
export async function mailTo(email: string, subject: RegExp): Promise<ParsedMail> {
  const folder = join(dataFolder(), 'mailbox');
  const newest = async (): Promise<string | undefined> => {
    const index = await readFile(join(folder, 'index.jsonl'), 'utf8').catch(() => '');
    const lines = index
      .split('\n')
      .filter(Boolean)
      .map((line) => JSON.parse(line) as MailboxLine);
    return lines.findLast((line) => line.to.includes(email) && subject.test(line.subject))?.id;
  };
  await expect.poll(newest, { message: `a mail to ${email}, ${subject}`, timeout: 20_000 }).toBeDefined();
  return simpleParser(await readFile(join(folder, `${await newest()}.eml`)));
}

/** The first address in a mail's text that begins with a path of ours. */
export function linkIn(mail: ParsedMail, path: string): string {
  const links = (mail.text ?? '').match(/https?:\/\/[^\s<>"')\]]+/g) ?? [];
  const found = links.find((link) => new URL(link).pathname.startsWith(path));
  if (!found) throw new Error(`No link to ${path} in: ${mail.text}`);
  return found;
}

/** Chooses a file that exists only here, as CSV. */
export async function chooseCsv(input: Locator, name: string, rows: readonly (readonly string[])[]): Promise<void> {
  const text = rows.map((row) => row.join(',')).join('\n');
  await input.setInputFiles({ name, mimeType: 'text/csv', buffer: Buffer.from(`${text}\n`) });
}

/** Today in UTC, as the product counts days. */
export const today = (): string => new Date().toISOString().slice(0, 10);

/** The month that ended last, or one so many months before it (a negative count) or after. */
export const month = (count = 0): string => addMonths(lastEndedMonth(today()), count);

export const dayOf = (inMonth: string, day: number): string => `${inMonth}-${String(day).padStart(2, '0')}`;

export const endOf = (inMonth: string): string => monthEnd(inMonth);
