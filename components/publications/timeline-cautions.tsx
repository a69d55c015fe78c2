import { AcknowledgeCautions } from '@/components/publications/acknowledge-cautions';
import { Footnotes } from '@/components/ui/footnotes';
import { DEFERRAL_SENTENCE } from '@/lib/cautions';
import { cautionMark, formatDate } from '@/lib/format';
import type { Acknowledgement, PublicationView } from '@/lib/publications/schema';

const WORDS = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine', 'Ten'];

export function cautionsTitle(count: number): string {
  return `${WORDS[count] ?? count} ${count === 1 ? 'caution' : 'cautions'}`;
}

interface Props {
  code: string;
  publication: PublicationView;
  /** The sponsor says that they have read them; the others see that they are there. */
  mayAcknowledge: boolean;
}

/** The cautions beside the dates that they touch, and who has acknowledged them. */
export function TimelineCautions({ code, publication, mayAcknowledge }: Props) {
  const { content, number, acknowledgedAt, acknowledgements, supersededBy } = publication;
  const { cautions } = content;
  const asks = mayAcknowledge && cautions.length > 0 && (!supersededBy || acknowledgedAt);
  return (
    <Footnotes
      id="cautions"
      title={cautionsTitle(cautions.length)}
      notes={cautions.map(({ text }, place) => ({ mark: cautionMark(place), text }))}
      rest={DEFERRAL_SENTENCE}
      action={
        asks ? (
          <AcknowledgeCautions code={code} number={number} acknowledgedAt={acknowledgedAt} />
        ) : (
          acknowledgements && cautions.length > 0 && <AcknowledgedBy acknowledgements={acknowledgements} />
        )
      }
    />
  );
}

function AcknowledgedBy({ acknowledgements }: { acknowledgements: Acknowledgement[] }) {
  if (acknowledgements.length === 0)
    return <p className="text-13">No sponsor viewer has a role in this study, so nobody acknowledges them.</p>;
  const done = acknowledgements.filter(({ acknowledgedAt }) => acknowledgedAt);
  return (
    <div className="text-13">
      <p className="font-600">
        Acknowledged by {done.length} of {acknowledgements.length} sponsor viewers
      </p>
      <ul>
        {acknowledgements.map(({ name, acknowledgedAt }) => (
          <li key={name}>
            {name}: {acknowledgedAt ? formatDate(acknowledgedAt.slice(0, 10)) : 'not yet'}
          </li>
        ))}
      </ul>
    </div>
  );
}
