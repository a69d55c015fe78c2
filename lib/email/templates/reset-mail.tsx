import { ActionLine, FootLine, Line, MailFrame, SMALL, TITLE_FACE } from './mail-frame';

export function ResetMail({ name, url }: { name: string; url: string }) {
  return (
    <MailFrame preview="The link works once, for 60 minutes.">
      <Line apart style={{ fontFamily: TITLE_FACE, fontSize: '24px', lineHeight: '30px' }}>
        Choose a new password
      </Line>
      <Line apart style={{ padding: '8px 32px 0' }}>
        {name}, somebody asked for a new password for your account with Kalends. Was it you? Then choose one now.
      </Line>
      <ActionLine href={url} label="Choose a new password" beside="works once" />
      <Line apart style={{ ...SMALL, padding: '12px 32px 0' }}>
        The link works for 60 minutes. With the new password, all your sessions end and you sign in again.
      </Line>
      <FootLine>If it was not you, leave the mail unanswered: your password stays as it is.</FootLine>
    </MailFrame>
  );
}
