import { render } from '@react-email/render';
import type { ReactElement } from 'react';
import type { RenderedMail } from './schema';

/** Width of the plain part: lines that a reply can quote without breaking. */
const TEXT_WIDTH = 72;

/** Both parts of a message out of one template, so that they can't say different things. */
export async function renderMail(message: ReactElement): Promise<RenderedMail> {
  return {
    html: await render(message),
    text: await render(message, {
      plainText: true,
      htmlToTextOptions: {
        wordwrap: TEXT_WIDTH,
        selectors: [
          { selector: 'td[data-apart]', format: 'block', options: { leadingLineBreaks: 2, trailingLineBreaks: 1 } },
        ],
      },
    }),
  };
}
