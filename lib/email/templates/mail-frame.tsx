import { Body, Head, Html, Preview } from '@react-email/components';
import type { CSSProperties, ReactNode } from 'react';

/* Mail programs know no style sheet of ours: the light sheet's tokens, inline. */
export const INK = '#1D2530';
export const INK_SOFT = '#56606D';
export const PAPER = '#FBFAF6';
export const RULE = '#D9D4C7';
export const PATIENTS = '#0E6B6F';
export const EVENTS = '#A6480F';
const CAUTION = '#7A5200';
const CAUTION_PAPER = '#FBF0D6';
export const TITLE_FACE = "Newsreader,Georgia,'Times New Roman',serif";
const TEXT_FACE = "'Public Sans','Helvetica Neue',Helvetica,Arial,sans-serif";

export const TEXT: CSSProperties = { fontFamily: TEXT_FACE, fontSize: '15px', lineHeight: '22px', color: INK };
export const SMALL: CSSProperties = { ...TEXT, fontSize: '13px', lineHeight: '18px', color: INK_SOFT };
export const LAYOUT = { role: 'presentation', cellPadding: 0, cellSpacing: 0, border: 0 } as const;

interface MailFrameProps {
  /** What a mailbox shows beside the subject. */
  preview: string;
  children: ReactNode;
}

/** The sheet of every message: tables and inline styles only, no image, no script, nothing fetched. */
export function MailFrame({ preview, children }: MailFrameProps) {
  return (
    <Html lang="en-GB">
      <Head>
        <meta name="color-scheme" content="light only" />
        <meta name="supported-color-schemes" content="light only" />
      </Head>
      <Preview>{preview}</Preview>
      <Body style={{ margin: 0, padding: '20px 0', backgroundColor: PAPER }}>
        <table
          {...LAYOUT}
          width="600"
          align="center"
          style={{ width: '100%', maxWidth: '600px', background: PAPER, borderCollapse: 'collapse' }}
        >
          <tbody>
            <tr>
              <td
                style={{
                  padding: '20px 32px 8px',
                  borderBottom: `3px double ${INK}`,
                  fontFamily: TITLE_FACE,
                  fontSize: '24px',
                  lineHeight: '28px',
                  color: INK,
                }}
              >
                Kalends
              </td>
            </tr>
            {children}
          </tbody>
        </table>
      </Body>
    </Html>
  );
}

interface LineProps {
  style?: CSSProperties;
  /** Begins a paragraph: further down in the HTML, after an empty line in the plain part. */
  apart?: boolean;
  children: ReactNode;
}

/** One row of the sheet. */
export function Line({ style, apart = false, children }: LineProps) {
  return (
    <tr>
      <td data-apart={apart || undefined} style={{ ...TEXT, padding: apart ? '20px 32px 0' : '4px 32px 0', ...style }}>
        {children}
      </td>
    </tr>
  );
}

/** The one action, with what it asks of the reader beside it. */
export function ActionLine({ href, label, beside }: { href: string; label: string; beside?: string }) {
  return (
    <tr>
      <td style={{ padding: '20px 32px 0' }}>
        <table {...LAYOUT}>
          <tbody>
            <tr>
              <td data-apart style={{ ...TEXT, background: INK, padding: '9px 20px' }}>
                <a href={href} style={{ color: PAPER, textDecoration: 'none', fontWeight: 600 }}>
                  {label}
                </a>
              </td>
              {beside && <td style={{ ...SMALL, verticalAlign: 'middle', paddingLeft: '12px' }}>{beside}</td>}
            </tr>
          </tbody>
        </table>
      </td>
    </tr>
  );
}

/** Cautions stand wherever a forecast stands. */
export function CautionBlock({ children }: { children: ReactNode }) {
  const rule = `1px solid ${CAUTION}`;
  return (
    <tr>
      <td data-apart style={{ padding: '20px 0 0' }}>
        <table
          {...LAYOUT}
          width="100%"
          style={{ width: '100%', background: CAUTION_PAPER, borderTop: rule, borderBottom: rule }}
        >
          <tbody>
            <tr>
              <td style={{ ...SMALL, color: INK, padding: '12px 32px' }}>
                <strong style={{ color: CAUTION }}>Cautions.</strong> {children}
              </td>
            </tr>
          </tbody>
        </table>
      </td>
    </tr>
  );
}

/** Small print at the end. */
export function FootLine({ children }: { children: ReactNode }) {
  return (
    <Line apart style={{ ...SMALL, padding: '12px 32px 20px' }}>
      {children}
    </Line>
  );
}
