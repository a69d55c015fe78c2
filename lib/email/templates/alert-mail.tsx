import { DEFERRAL_SENTENCE, DEMONSTRATION_SENTENCE } from '../../cautions';
import type { MilestoneForecast } from '../../engine/types';
import { formatDate, formatPercent } from '../../format';
import type { MilestoneWords } from '../../publications/rules';
import type { MailBrackets } from './alert-brackets';
import { BracketLines } from './bracket-lines';
import { ActionLine, CautionBlock, FootLine, INK_SOFT, Line, MailFrame, SMALL, TEXT, TITLE_FACE } from './mail-frame';

export interface AlertMailProps {
  study: { code: string; title: string };
  publication: { number: number; publishedOn: string; dataCutoff: string; note: string; publishedBy: string };
  /** What the range below does not say by itself. */
  news: string | null;
  milestone: { name: string; waitsFor: string; kind: MilestoneForecast['kind']; words: MilestoneWords };
  /** `16 days later than in publication 4 (Nov 2027 to Jan 2028, median 11 Dec 2027).` */
  moved: { lead: string; rest: string } | null;
  brackets: MailBrackets | null;
  cautions: string[];
  /** Why the reader gets this: `the interim analysis slips by 14 days or more`. */
  rule: string;
  url: string;
  isDemonstration: boolean;
}

/** What a publication says about one milestone, to those whom a rule of the study names. */
export function AlertMail(props: AlertMailProps) {
  const { study, publication, milestone, moved, brackets, cautions, isDemonstration } = props;
  const { words } = milestone;
  const planned = words.planned && `Planned ${words.planned}${words.chance ? `: ${words.chance}` : ''}.`;
  return (
    <MailFrame
      preview={[words.exact, `Publication ${publication.number}, from data to ${formatDate(publication.dataCutoff)}.`]
        .filter(Boolean)
        .join('. ')}
    >
      <Line apart style={SMALL}>
        {study.code}, {study.title}
        <br />
        Publication {publication.number} of {formatDate(publication.publishedOn)}, from data to{' '}
        {formatDate(publication.dataCutoff)}
      </Line>
      {props.news && <Line apart>{props.news}</Line>}
      <Line apart>
        <strong>{milestone.name}</strong>, {milestone.waitsFor}
      </Line>
      <Line style={{ padding: '0 32px', fontFamily: TITLE_FACE, fontSize: '34px', lineHeight: '40px' }}>
        {words.range}
        {words.isRange && <span style={{ ...TEXT, color: INK_SOFT }}> &nbsp;{formatPercent(0.8)}</span>}
      </Line>
      {(words.exact || moved || planned) && (
        <Line>
          {words.exact && (
            <>
              {words.exact}.<br />
            </>
          )}
          {moved && (
            <>
              <strong>{moved.lead}</strong> {moved.rest}
              <br />
            </>
          )}
          {planned}
        </Line>
      )}
      {brackets && <BracketLines {...brackets} kind={milestone.kind} />}
      <Line apart>“{publication.note}”</Line>
      <Line style={SMALL}>{publication.publishedBy}, protocol statistician</Line>
      <ActionLine href={props.url} label="Open the timeline" beside="asks you to sign in" />
      <CautionBlock>{[...cautions, DEFERRAL_SENTENCE].join(' ')}</CautionBlock>
      <FootLine>
        You are told because a rule of this study says so: {props.rule}. The protocol statistician keeps its rules; ask
        them to change what you are told. This mail holds no figure of a patient or a site.
        {isDemonstration && (
          <>
            <br />
            {DEMONSTRATION_SENTENCE}
          </>
        )}
      </FootLine>
    </MailFrame>
  );
}
