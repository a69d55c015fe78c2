import { formatInstant } from '../../format';
import { ActionLine, FootLine, Line, MailFrame, SMALL, TITLE_FACE } from './mail-frame';

export interface InvitationMailProps {
  organisationName: string;
  studyTitle: string | null;
  roleName: string;
  inviterName: string;
  recipient: string;
  url: string;
  expiresAt: string;
}

export function InvitationMail(props: InvitationMailProps) {
  const { organisationName, studyTitle, roleName, inviterName } = props;
  return (
    <MailFrame preview={`${inviterName}, ${organisationName}: your role is ${roleName}.`}>
      <Line apart style={SMALL}>
        {organisationName}
        {studyTitle && (
          <>
            <br />
            {studyTitle}
          </>
        )}
      </Line>
      <Line apart style={{ fontFamily: TITLE_FACE, fontSize: '24px', lineHeight: '30px' }}>
        {inviterName} invites you
      </Line>
      <Line apart style={{ padding: '8px 32px 0' }}>
        {studyTitle
          ? `You are asked to take part in this study as ${roleName}.`
          : `You are asked to join ${organisationName} as ${roleName}.`}{' '}
        Kalends keeps the study’s months and forecasts when its patients and events will be in.
      </Line>
      <ActionLine href={props.url} label="Accept the invitation" beside="works once" />
      <Line apart style={{ ...SMALL, padding: '12px 32px 0' }}>
        The link works until {formatInstant(props.expiresAt)} UTC, for {props.recipient} only.
      </Line>
      <FootLine>
        If you do not know {inviterName} or did not expect this, leave the mail unanswered: nothing happens without the
        link.
      </FootLine>
    </MailFrame>
  );
}
