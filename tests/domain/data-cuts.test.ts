import { describe, expect, it } from 'vitest';
import {
  countSubjects,
  type CutSite,
  differencesOf,
  noteNeededSentence,
  reconcile,
  subjectFaults,
} from '@/lib/data-cuts/rules';
import { InvalidError } from '@/lib/errors';
import type { SiteEnrolment } from '@/lib/site-log/queries';
import { readListing } from '@/lib/subject-listings/rules';

const sites = new Map<string, CutSite>([
  ['101', { activatedOn: '2026-02-10', closedOn: null }],
  ['102', { activatedOn: '2026-02-10', closedOn: '2026-12-31' }],
  ['151', { activatedOn: null, closedOn: null }],
]);
const cutoffOn = '2027-03-31';
const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);
const read = (source: string | Uint8Array) =>
  readListing(typeof source === 'string' ? bytesOf(source) : source, 'KLD-301', (subject) =>
    subjectFaults(subject, { sites, cutoffOn }),
  );

const head = 'subject,site,randomised on,status,status on';
const one = '0001,101,2026-03-02,event,12 Sep 2026';

function refusal(source: string | Uint8Array): string[] {
  try {
    read(source);
  } catch (error) {
    if (error instanceof InvalidError) return error.faults.map((fault) => fault.detail);
    throw error;
  }
  return [];
}

describe('a subject listing is read', () => {
  const subject = {
    row: 2,
    id: '0001',
    site: '101',
    randomisedOn: '2026-03-02',
    status: 'event',
    statusOn: '2026-09-12',
  };

  it('with commas, semicolons or tabs, quotation marks, blank rows and any end of line', () => {
    for (const separator of [',', ';', '\t']) {
      for (const end of ['\n', '\r\n']) {
        const text = [head, '"0001",101,2026-03-02,"Event",2026-09-12', ',,,,', '']
          .join(end)
          .replaceAll(',', separator);
        expect(read(text)).toMatchObject({ form: 'own', rows: 1, subjects: [subject], faultCount: 0 });
      }
    }
  });

  it('with a byte order mark, in UTF-8 and in UTF-16 of either order', () => {
    const text = `${head}\n${one}`;
    expect(read(`\uFEFF${text}`).subjects).toEqual([subject]);
    const little = Buffer.from(`\uFEFF${text}`, 'utf16le');
    expect(read(little).subjects).toEqual([subject]);
    expect(read(Buffer.from(little).swap16()).subjects).toEqual([subject]);
  });

  it('with its columns in another order and spelling', () => {
    expect(read('Status On;STATUS;Site ID;ID;Randomized_on\n2026-09-12;EVENT;101;0001;2 March 2026').subjects).toEqual([
      subject,
    ]);
  });

  it('keeps separators inside quotation marks', () => {
    expect(read(`${head}\n"0001, Leith",101,2026-03-02,event,2026-09-12`).subjects[0]!.id).toBe('0001, Leith');
  });

  it('knows every status and both spellings of loss', () => {
    const words = ['event', 'Event pending', 'withdrawn', 'lost to follow-up', 'completed', 'AT RISK'];
    const rows = words.map((word, place) => `S${place},101,2026-03-02,${word},2026-09-12`);
    expect(read([head, ...rows].join('\n')).subjects.map((row) => row.status)).toEqual([
      'event', 'event-pending', 'withdrawn', 'withdrawn', 'completed', 'at-risk',
    ]); // prettier-ignore
  });
});

describe('an ADaM time-to-event listing', () => {
  const adam = 'STUDYID,USUBJID,SITEID,STARTDT,ADT,CNSR,EVNTDESC';
  const status = (cnsr: string, description: string) => {
    const listing = read(`${adam}\nKLD-301,KLD-301-0001,101,2026-03-02,12SEP2026,${cnsr},${description}`);
    return listing.subjects[0]?.status ?? listing.faults.map((fault) => `${fault.column}: ${fault.detail}`);
  };

  it('takes CNSR 0 for the event, and tells censorings apart by EVNTDESC', () => {
    expect(status('0', 'FIRST CARDIOVASCULAR EVENT')).toBe('event');
    expect(status('0', 'EVENT - ADJUDICATION PENDING')).toBe('event-pending');
    expect(status('1', 'WITHDRAWAL OF CONSENT')).toBe('withdrawn');
    expect(status('2', 'LOST TO FOLLOW-UP')).toBe('withdrawn');
    expect(status('1', 'COMPLETED STUDY')).toBe('completed');
    expect(status('1', 'CENSORED AT DATA CUT-OFF')).toBe('at-risk');
  });

  it('asks back what it can’t tell', () => {
    expect(status('1', 'CENSORED')).toEqual([expect.stringMatching(/^EVNTDESC: “CENSORED” does not say why/)]);
    expect(status('1', '')).toEqual([expect.stringMatching(/^EVNTDESC: EVNTDESC is empty/)]);
    expect(status('1', 'COMPLETED THEN LOST')).toEqual([expect.stringMatching(/reads as withdrawn and as completed/)]);
    expect(status('N', 'EVENT')).toEqual(['CNSR: CNSR is 0 for an event and 1 or higher for a censoring.']);
  });

  it('of another study is refused', () => {
    const { faults } = read(`${adam}\nKLD-302,1,101,2026-03-02,2026-09-12,0,DEATH`);
    expect(faults).toEqual([
      { row: 2, column: 'STUDYID', value: 'KLD-302', detail: 'This study is KLD-301. Send its own listing.' },
    ]);
  });
});

describe('columns', () => {
  it.each(['ARM', 'ARMCD', 'ACTARM', 'ACTARMCD', 'TRT01P', 'TRT01A', 'TRTP', 'TRTA', 'TRTSEQP', 'TRT', 'treatment', 'Treatment arm', 'arm code'])(
    '%s is refused by name, with why',
    (column) => {
      expect(refusal(`${head},${column}\n${one},A`)).toEqual([
        `Column 6, “${column}”, carries treatment. This product is blinded: no treatment arm is stored, asked for or shown. Send the file without it.`,
      ]);
    },
  ); // prettier-ignore

  it('that are unknown, nameless, twice there or missing are refused by name, all at once', () => {
    expect(refusal('subject,site,randomised on,Subject ID,sex,,status\n0001,101,2026-03-02,1,f,,event')).toEqual([
      'Column 4, “Subject ID”, says the same as column 1. Leave one out.',
      'Column 5, “sex”, is not one of a listing. A listing has subject, site, randomised on, status and status on. Leave it out.',
      'Column 6 has no name. A listing has subject, site, randomised on, status and status on. Leave it out.',
      'There is no column “status on”. A listing has subject, site, randomised on, status and status on.',
    ]);
    expect(refusal('USUBJID,SITEID,STARTDT,ADT,CNSR,EVNTDESC,PARAMCD\n')[0]).toMatch(
      /^Column 7, “PARAMCD”, is not one/,
    );
  });
});

describe('a file that is no listing', () => {
  it.each([
    ['nothing', '', /empty/],
    ['a head alone', head, /no subjects/],
    ['a picture', Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 0, 0, 0xff]), /not (a )?text/],
    ['Latin-1', Buffer.from('subject,site\nPoznañ,1', 'latin1'), /not text in UTF-8/],
    ['a stray quotation mark', `${head}\n0001,10"1,2026-03-02,event,2026-09-12`, /Line 2 has a quotation mark/],
    ['a million columns', 'a,'.repeat(1_000_000), /far longer|columns/],
  ])('%s', (_what, source, sentence) => {
    expect(refusal(source)[0]).toMatch(sentence);
  });
});

describe('faults of the rows', () => {
  it('come all at once, with row, column, value and what would be right', () => {
    const listing = read(
      [
        head,
        one,
        '0001,101,2026-03-02,event,2026-09-12',
        '0003,999,03/04/26,dead,2026-13-01',
        '0004,101,2026-02-09,at-risk,2027-04-01',
        '0005,102,2027-01-04,event,2027-01-03',
        '0006,151,2026-05-05,at-risk,2027-03-31',
        ',101,2027-04-01,at-risk,',
        '0008,101,2026-05-05',
      ].join('\n'),
    );
    expect(listing.subjects.map((subject) => subject.id)).toEqual(['0001']);
    expect(listing.faults.map(({ row, column, value, detail }) => [row, column, value, detail])).toEqual([
      [3, 'subject', '0001', '0001 stands in row 2 already. Each subject has one row.'],
      [4, 'randomised on', '03/04/26', '“03/04/26” is 3 Apr 2026 or 4 Mar 2026. Write 2026-04-03 or 2026-03-04.'],
      [4, 'status', 'dead', '“dead” is no status. Write one of event, event-pending, withdrawn, completed, at-risk.'],
      [4, 'status on', '2026-13-01', '“2026-13-01” is not a date. Write it like 2027-03-14 or 14 Mar 2027.'],
      [4, 'site', '999', 'The study has no site 999. Correct the code, or add the site first.'],
      [5, 'randomised on', '2026-02-09', 'Site 101 opened on 10 Feb 2026. Give that day or a later one, or correct the activation.'],
      [5, 'status on', '2027-04-01', 'This is after the cut-off, 31 Mar 2027. Give the status as it was on that day, or move the cut-off.'],
      [6, 'randomised on', '2027-01-04', 'Site 102 closed on 31 Dec 2026. Give that day or an earlier one, or correct the closure.'],
      [6, 'status on', '2027-01-03', 'This is before the randomisation, 4 Jan 2027. Give that day or a later one.'],
      [7, 'site', '151', 'Site 151 has no day of activation. Record it first.'],
      [8, 'subject', '', 'This cell is empty. Give the subject’s identifier.'],
      [8, 'status on', '', 'This cell is empty. Give a date like 2027-03-14.'],
      [8, 'randomised on', '2027-04-01', 'This is after the cut-off, 31 Mar 2027. Leave the subject out, or move the cut-off.'],
      [9, null, null, 'This row has 3 cells, the head 5. A separator inside a cell needs quotation marks around it.'],
    ]); // prettier-ignore
  });

  it('are spelt out five hundred times and counted to the last', () => {
    const rows = Array.from({ length: 1200 }, (_, place) => `S${place},999,2026-03-02,event,2026-09-12`);
    const listing = read([head, ...rows].join('\n'));
    expect([listing.faults.length, listing.faultCount, listing.subjects.length]).toEqual([500, 1200, 0]);
  });
});

it('two hundred thousand rows are read, one more is refused', () => {
  const rows = Array.from({ length: 200_000 }, (_, place) => `S${place},101,2026-03-02,at-risk,2027-03-31`);
  const started = performance.now();
  expect(read([head, ...rows].join('\n')).subjects).toHaveLength(200_000);
  expect(performance.now() - started).toBeLessThan(5_000);
  expect(refusal([head, ...rows, one].join('\n'))).toEqual([
    'The file has more than 200,000 subjects, the most that a data cut takes.',
  ]);
});

describe('listing and log', () => {
  const logged = (code: string, months: Record<string, number>): SiteEnrolment => ({
    code,
    country: 'GB',
    activatedOn: '2026-02-10',
    closedOn: null,
    planned: null,
    cap: null,
    randomised: Object.values(months).reduce((sum, count) => sum + count, 0),
    loggedThrough: cutoffOn,
    unlogged: [],
    monthly: Object.entries(months).map(([month, randomised]) => ({ month, randomised })),
  });
  const listed = (site: string, ...days: string[]) => days.map((randomisedOn) => ({ site, randomisedOn }));

  it('are compared on the months that the site logged; a month not logged is no disagreement', () => {
    const rows = reconcile(
      [
        ...listed('101', '2026-02-11', '2026-03-02', '2026-04-05'),
        ...listed('102', '2026-02-12', '2026-02-13'),
        ...listed('103', '2026-04-01'),
      ],
      [
        logged('101', { '2026-02': 1, '2026-03': 1 }),
        logged('102', { '2026-02': 3 }),
        logged('103', {}),
        logged('104', { '2026-02': 2 }),
        logged('105', {}),
      ],
    );
    expect(rows).toEqual([
      { site: '101', listed: 3, logged: 2, notLogged: 1, agrees: true },
      { site: '102', listed: 2, logged: 3, notLogged: 0, agrees: false },
      { site: '103', listed: 1, logged: 0, notLogged: 1, agrees: true },
      { site: '104', listed: 0, logged: 2, notLogged: 0, agrees: false },
    ]);
    expect(noteNeededSentence(differencesOf(rows))).toBe(
      'Listing and log disagree at 2 sites (102, 104). Say in a note why they differ.',
    );
  });

  it('subjects are counted by status', () => {
    const counts = countSubjects([{ status: 'event' }, { status: 'at-risk' }, { status: 'event' }]);
    expect(counts).toEqual({
      subjects: 3,
      byStatus: { event: 2, 'event-pending': 0, withdrawn: 0, completed: 0, 'at-risk': 1 },
    });
  });
});
