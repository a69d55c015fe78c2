import { describe, expect, it } from 'vitest';
import { InvalidError } from '@/lib/errors';
import { readSiteList } from '@/lib/site-lists/rules';

const today = '2027-04-05';
const head = 'code,name,city,country,earliest,likely,latest,activated,closed,cap';
const bytes = (text: string): Uint8Array => new TextEncoder().encode(text);
const read = (text: string) => readSiteList(bytes(text), today);

/** The sentences with which a file is refused. */
function refusal(source: string | Uint8Array): string[] {
  try {
    readSiteList(typeof source === 'string' ? bytes(source) : source, today);
  } catch (error) {
    if (error instanceof InvalidError) return error.faults.map((fault) => fault.detail);
    throw error;
  }
  return [];
}

const poznan = {
  code: '107',
  name: 'Lipowa Kidney Clinic',
  city: 'Poznań',
  country: 'PL',
  activatedOn: '2026-04-14',
  closedOn: null,
  cap: 40,
};

describe('a site list is read', () => {
  it('with commas, semicolons or tabs, quotation marks and blank rows', () => {
    for (const separator of [',', ';', '\t']) {
      const text = [
        head,
        '107,Lipowa Kidney Clinic,Poznań,pl,,,,14 Apr 2026,,40',
        '',
        '151,Praxis,Rostock,DE,2027-05-01,2027-05-31,2027-08-29,,,',
      ]
        .join('\r\n')
        .replaceAll(',', separator);
      expect(read(text)).toEqual([
        { row: 2, site: { ...poznan, plannedEarliest: null, plannedLikely: null, plannedLatest: null } },
        {
          row: 4,
          site: expect.objectContaining({ code: '151', plannedLikely: '2027-05-31', activatedOn: null, cap: null }),
        },
      ]);
    }
    expect(read(`${head}\n107,"Lipowa, Clinic",Poznań,PL,,,,2026-04-14,,`)[0]!.site.name).toBe('Lipowa, Clinic');
  });

  it('with a byte order mark, and in UTF-16 where one says so', () => {
    const text = `code,name,city,country,activated\n107,Lipowa,Poznań,PL,2026-04-14`;
    const utf16 = new Uint8Array(Buffer.from(`\ufeff${text}`, 'utf16le'));
    for (const source of [bytes(`\ufeff${text}`), utf16, new Uint8Array(Buffer.from(utf16).swap16())]) {
      expect(readSiteList(source, today)[0]!.site.city).toBe('Poznań');
    }
  });
});

describe('a site list is refused', () => {
  it('with every fault by row and column at once', () => {
    const text = [
      head,
      '107,Lipowa,Poznań,PL,,,,2027-04-06,,0',
      '108,,Szczecin,XX,2027-06-01,2027-05-01,2027-07-01,,,',
      '107,Second,Poznań,PL,,,,2026-04-14,,1.234',
      '109,Jasna Polana,Katowice,PL,,,,03/04/27,,',
      '110,Too,Few',
      'A/B,Slash,Leith,GB,,,,2026-04-14,,',
      '111,Never,Leith,GB,,,,2026-02-30,,',
      '112,Named,Leith,GB,,,,31/12/2026,,',
    ].join('\n');
    expect(refusal(text)).toEqual([
      'Row 2, cap: A cap is at least 1. Leave it empty where there is none.',
      'Row 3, name: Give the site’s name.',
      expect.stringMatching(/^Row 3, country: /),
      'Row 4, cap: “1.234” is not a whole number in plain figures, for example 40.',
      'Row 5, activated: “03/04/27” is 3 Apr 2027 or 4 Mar 2027. Write 2027-04-03 or 2027-03-04.',
      expect.stringMatching(/^Row 6 has 3 cells, the head 10/),
      expect.stringMatching(/^Row 7, code: /),
      expect.stringMatching(/^Row 8, activated: “2026-02-30” is not a date/),
      'Row 9, activated: Write “31/12/2026” as 2026-12-31 or 31 Dec 2026.',
    ]);
  });

  it('for what the rules of a site say, and for a code that stands twice in any spelling', () => {
    const text = [head, 'a1,One,Leith,GB,,,,2027-04-06,,', 'A1,Two,Leith,GB,2027-06-01,2027-05-01,2027-07-01,,,'].join(
      '\n',
    );
    expect(refusal(text)).toEqual([
      expect.stringMatching(/^Row 2, activated: An activation is a day that has come/),
      expect.stringMatching(/^Row 3, likely: The likely day lies before the earliest/),
      'Row 3, code: A1 stands in row 2 already. Each site has a code of its own.',
    ]);
  });

  it('for a column that carries treatment, by name, and for columns that are none or missing', () => {
    expect(refusal('code,name,city,TRT01P,region,name\n1,a,b,c,d,e')).toEqual([
      'Column 4, “TRT01P”, carries treatment. This product is blinded: no treatment arm is stored, asked for or shown. Send the file without it.',
      expect.stringMatching(/^Column 5, “region”, is not one of a site list/),
      'Column 6 is a second “name”. Leave one out.',
      'There is no column “country”. Add it to the head.',
    ]);
  });

  it('when it is empty, no text, not UTF-8, all head, too long or too wide', () => {
    expect(refusal('')[0]).toMatch(/empty/);
    expect(refusal(head)[0]).toMatch(/no sites/);
    expect(refusal(new Uint8Array([0x50, 0x4b, 0x03, 0x04, 0x00, 0x00]))[0]).toMatch(/not a text file/);
    expect(refusal(new Uint8Array([0x63, 0xff, 0x6f]))[0]).toMatch(/UTF-8/);
    expect(refusal(`${head}\n${'1,a,b,GB,,,,,,\n'.repeat(5001)}`)[0]).toMatch(/at most 5000/);
    expect(refusal(`${'x,'.repeat(500_000)}\n`)[0]).toMatch(/Line|columns/);
    expect(refusal(`${head}\n1,"unclosed,b,GB,,,,,,`)[0]).toMatch(/quotation mark/);
  });

  it('within a second and with a bounded list when every row is wrong', () => {
    const started = performance.now();
    const sentences = refusal(
      `${head}\n${Array.from({ length: 5000 }, (_, place) => `${place},,,ZZ,x,y,z,,,`).join('\n')}`,
    );
    expect(sentences).toHaveLength(501);
    expect(sentences.at(-1)).toMatch(/^And \d+ more/);
    expect(performance.now() - started).toBeLessThan(3000);
  });
});
