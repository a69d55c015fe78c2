import { createElement } from 'react';
import { describe, expect, it } from 'vitest';
import type { AlertCondition } from '@/lib/alerts/schema';
import { DEFERRAL_SENTENCE } from '@/lib/cautions';
import { alertMailProps } from '@/lib/email/alert-message';
import { oneLine } from '@/lib/email/commands';
import { renderMail } from '@/lib/email/render';
import { AlertMail } from '@/lib/email/templates/alert-mail';
import { mailBrackets } from '@/lib/email/templates/alert-brackets';
import { InvitationMail } from '@/lib/email/templates/invitation-mail';
import { ResetMail } from '@/lib/email/templates/reset-mail';
import type { MilestoneForecast } from '@/lib/engine/types';
import { fixtureContent, fixtureMilestone, FORBIDDEN, reached, shifted } from '@/tests/domain/publications-fixture';

const DATES = { '0.1': '2027-11-23', '0.5': '2027-12-26', '0.9': '2028-02-03' };
const dated = (one: MilestoneForecast): MilestoneForecast =>
  one.code === 'IA'
    ? { ...one, plannedOn: '2027-10-31', probabilityByPlanned: 0.012, quantiles: { ...one.quantiles, ...DATES } }
    : one;

async function alert(
  options: { change?: (one: MilestoneForecast) => MilestoneForecast; note?: string; condition?: AlertCondition } = {},
) {
  const {
    change = dated,
    note = 'March brought fewer events than expected.',
    condition = { kind: 'slips', days: 14 },
  } = options;
  const props = alertMailProps(
    {
      milestoneCode: 'IA',
      milestoneName: 'Interim analysis',
      condition,
      publicationNumber: 5,
      headline: 'Interim analysis moved.',
    },
    {
      publication: { number: 5, note, content: fixtureContent(change), publishedAt: new Date('2027-04-06T10:00:00Z') },
      before: {
        number: 4,
        note: 'Before.',
        content: fixtureContent((one) => shifted(dated(one), -16)),
        publishedAt: new Date('2027-03-02T10:00:00Z'),
      },
      publishedBy: 'Ines Calder',
      isDemonstration: true,
    },
  );
  return renderMail(createElement(AlertMail, props));
}

/** The words of the HTML part, as a reader sees them. */
const words = (html: string) =>
  html
    .replace(/<style[\s\S]*?<\/style>|<!--[\s\S]*?-->|<[^>]+>/g, '')
    .replaceAll('&nbsp;', ' ')
    .replaceAll('&#x27;', "'")
    .replace(/\s+/g, ' ');

describe('an alert', () => {
  it('says the same in both parts: what, when, how far, why, what to beware of', async () => {
    const { html, text } = await alert();
    for (const part of [words(html), text.replace(/\s+/g, ' ')]) {
      for (const phrase of [
        'KLD-900',
        'Publication 5 of 6 Apr 2027, from data to 31 Mar 2027',
        'Interim analysis, the 288th event',
        'Nov 2027 to Feb 2028',
        '23 Nov 2027 to 3 Feb 2028; median 26 Dec 2027.',
        '16 days later than in publication 4 (Nov 2027 to Jan 2028, median 10 Dec 2027).',
        'Planned 31 Oct 2027: 1 % chance by then.',
        'March brought fewer events than expected.',
        'Ines Calder, protocol statistician',
        'Only 2 events have been seen so far',
        DEFERRAL_SENTENCE,
        'the interim analysis slips by 14 days or more against the last publication',
        'asks you to sign in',
        'Invented data for demonstration',
      ])
        expect(part.replaceAll('\u00a0', ' ')).toContain(phrase.replaceAll('\u00a0', ' '));
      // A caution of another milestone does not belong to this one.
      expect(part).not.toContain('overdue to open');
    }
    expect(text).toMatch(/Open the timeline\s+http:\/\/\S+\/studies\/KLD-900\/timeline/);
    expect(html).toContain('/studies/KLD-900/timeline"');
  });

  it('holds no site, no subject, no script, no image and nothing to fetch', async () => {
    const { html, text } = await alert();
    for (const word of FORBIDDEN) expect(html + text).not.toContain(word);
    expect(html).not.toMatch(/<(script|img|link|iframe|style)\b/i);
    expect(html).not.toMatch(/url\(/i);
    expect(text).not.toMatch(/<[a-z]/i);
  });

  it('what a statistician types stays text', async () => {
    const { html } = await alert({ note: '<img src=x onerror=alert(1)> & "so on"' });
    expect(html).not.toMatch(/<img/i);
    expect(html).toContain('&lt;img');
  });

  it('lines of the plain part can be quoted', async () => {
    const { text } = await alert();
    expect(
      Math.max(
        ...text
          .split('\n')
          .filter((line) => !line.includes('http'))
          .map((line) => line.length),
      ),
    ).toBeLessThanOrEqual(72);
  });

  it('of a reached milestone, and of one that hardly any draw reaches, draws no range', async () => {
    const there = await alert({
      change: (one) => (one.code === 'IA' ? reached(one, '2027-03-20') : one),
      condition: { kind: 'reached' },
    });
    expect(there.text).toContain('Reached 20 Mar 2027');
    expect(there.text).not.toMatch(/80.%/);
    const never = await alert({
      change: (one) => ({
        ...one,
        probabilityReached: 0.01,
        quantiles: { ...one.quantiles, '0.1': null, '0.5': null, '0.9': null },
      }),
    });
    expect(never.text).toMatch(/Not reached\s+not reached in 99.% of draws/);
  });
});

describe('the brackets of the mail', () => {
  const at = (days: number) => ({ publishedOn: '2027-04-06', milestone: shifted(dated(fixtureMilestone('IA')), days) });
  it('lie on one calendar, the later one further right', () => {
    const { now, before, calendar } = mailBrackets(at(0), at(-16))!;
    for (const bracket of [now, before!]) {
      expect(bracket.from).toBeGreaterThanOrEqual(0);
      expect(bracket.from).toBeLessThan(bracket.median);
      expect(bracket.median).toBeLessThan(bracket.to);
      expect(bracket.to).toBeLessThanOrEqual(100);
    }
    expect(before!.median).toBeLessThan(now.median);
    const months = (list: { months: number }[]) => list.reduce((sum, one) => sum + one.months, 0);
    expect(months(calendar.years)).toBe(months(calendar.ticks));
    expect(calendar.ticks.length).toBeLessThanOrEqual(8);
  });
  it('of years still fit, and an open end is not drawn', () => {
    const wide = at(0);
    wide.milestone.quantiles['0.9'] = '2035-02-03';
    expect(mailBrackets(wide, null)!.calendar.ticks.length).toBeLessThanOrEqual(8);
    wide.milestone.quantiles['0.9'] = null;
    expect(mailBrackets(wide, null)).toBeNull();
  });
});

describe('the other messages', () => {
  it('an invitation names who, what, as what and until when, and its link', async () => {
    const { html, text } = await renderMail(
      createElement(InvitationMail, {
        organisationName: 'Larkfield Biometrics',
        studyTitle: 'KLD-301, velmorat against placebo',
        roleName: 'sponsor viewer',
        inviterName: 'Priya Nandakumar',
        recipient: 'marcus@orrin.example',
        url: 'https://kalends.example/invitation/abc',
        expiresAt: '2027-04-13T09:30:00.000Z',
      }),
    );
    for (const part of [words(html), text.replace(/\s+/g, ' ')])
      for (const phrase of [
        'Larkfield Biometrics',
        'KLD-301',
        'sponsor viewer',
        'Priya Nandakumar',
        '13 Apr 2027, 09:30',
        'marcus@orrin.example',
      ])
        expect(part).toContain(phrase);
    expect(text).toContain('https://kalends.example/invitation/abc');
    expect(html).toContain('href="https://kalends.example/invitation/abc"');
  });

  it('a reset holds its link and says what happens without it', async () => {
    const { text } = await renderMail(
      createElement(ResetMail, { name: 'Ines', url: 'https://kalends.example/reset/abc' }),
    );
    expect(text).toContain('https://kalends.example/reset/abc');
    expect(text.replace(/\s+/g, ' ')).toContain('your password stays as it is');
  });
});

describe('a header', () => {
  it('is one line, whatever a name or a title brings along', () => {
    expect(oneLine('A\r\nBcc: everyone@example.test')).toBe('A Bcc: everyone@example.test');
    expect(oneLine('A\u2028B\u0000C\tD')).toBe('A B C D');
    expect(oneLine('x'.repeat(500))).toHaveLength(200);
  });
});
