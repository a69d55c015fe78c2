import type { CSSProperties } from 'react';
import { EVENTS, INK, INK_SOFT, LAYOUT, PAPER, PATIENTS, RULE, SMALL, TITLE_FACE } from './mail-frame';
import type { MailBracket, MailCalendar } from './alert-brackets';

const FULL: CSSProperties = { width: '100%', borderCollapse: 'collapse', tableLayout: 'fixed' };
const HAIR: CSSProperties = { padding: 0, fontSize: '1px', lineHeight: '1px', height: '12px', verticalAlign: 'top' };
const TONES = { randomised: PATIENTS, events: EVENTS, 'follow-up': INK, 'all-of': INK } as const;

interface BracketLinesProps {
  calendar: MailCalendar;
  kind: keyof typeof TONES;
  now: MailBracket;
  before: MailBracket | null;
}

/** The range of dates against the one before it, drawn with the borders of table cells; the words above say the same. */
export function BracketLines({ calendar, kind, now, before }: BracketLinesProps) {
  const head: CSSProperties = { ...SMALL, padding: '2px 0 0 4px', borderLeft: `1px solid ${RULE}` };
  return (
    <tr data-skip-in-text="true">
      <td style={{ padding: '20px 32px 0' }}>
        <table {...LAYOUT} width="100%" style={FULL}>
          <tbody>
            <tr>
              {calendar.years.map(({ year, months }) => (
                <td
                  key={year}
                  colSpan={months}
                  style={{ ...head, fontFamily: TITLE_FACE, fontSize: '15px', lineHeight: '20px', color: INK }}
                >
                  {year}
                </td>
              ))}
            </tr>
            <tr>
              {calendar.ticks.map((tick) => (
                <td
                  key={tick.label + tick.months}
                  colSpan={tick.months}
                  style={{ ...head, borderBottom: `1px solid ${INK_SOFT}`, paddingBottom: '2px' }}
                >
                  {tick.label}
                </td>
              ))}
            </tr>
          </tbody>
        </table>
        {before && <BracketLine bracket={before} colour={INK_SOFT} line="1px dashed" />}
        <BracketLine bracket={now} colour={TONES[kind]} line="3px double" filled />
      </td>
    </tr>
  );
}

interface BracketLineProps {
  bracket: MailBracket;
  colour: string;
  line: string;
  filled?: boolean;
}

function BracketLine({ bracket, colour, line, filled = false }: BracketLineProps) {
  const { from, median, to, label } = bracket;
  const under = { borderBottom: `${line} ${colour}` };
  const cells: { share: number; style: CSSProperties; mark?: boolean }[] = [
    { share: from, style: {} },
    { share: median - 1 - from, style: { ...under, borderLeft: `2px solid ${colour}` } },
    { share: 2, style: under, mark: true },
    { share: to - median - 1, style: { ...under, borderRight: `2px solid ${colour}` } },
    { share: 100 - to, style: {} },
  ];
  return (
    <>
      <div style={{ ...SMALL, paddingTop: '8px', color: filled ? INK : INK_SOFT, fontWeight: filled ? 600 : 400 }}>
        {label}
      </div>
      <table {...LAYOUT} width="100%" style={FULL}>
        <tbody>
          <tr>
            {cells.map(({ share, style, mark }, place) => (
              <td
                key={place}
                width={`${share.toFixed(1)}%`}
                style={{ ...HAIR, ...style, width: `${share.toFixed(1)}%` }}
              >
                {mark ? (
                  <div
                    style={{
                      width: '9px',
                      height: '9px',
                      lineHeight: '9px',
                      margin: '0 auto',
                      boxSizing: 'border-box',
                      border: `1px solid ${colour}`,
                      background: filled ? colour : PAPER,
                    }}
                  >
                    &nbsp;
                  </div>
                ) : (
                  <>&nbsp;</>
                )}
              </td>
            ))}
          </tr>
        </tbody>
      </table>
    </>
  );
}
