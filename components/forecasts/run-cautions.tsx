import { Footnotes } from '@/components/ui/footnotes';
import { DEFERRAL_SENTENCE } from '@/lib/cautions';
import type { Caution } from '@/lib/engine/types';
import { cautionMark } from '@/lib/format';

/** In the team's words, with sites named; the sponsor's wording counts them. They stand wherever the forecast stands. */
export function RunCautions({ cautions }: { cautions: readonly Caution[] }) {
  return (
    <Footnotes
      title="Cautions"
      columns={cautions.length > 1 ? 2 : 1}
      className="mt-8"
      notes={cautions.map(({ text }, place) => ({ mark: cautionMark(place), text }))}
      rest={
        <>
          {cautions.length === 0 && 'None of this run’s own. '}
          {DEFERRAL_SENTENCE}
        </>
      }
    />
  );
}
