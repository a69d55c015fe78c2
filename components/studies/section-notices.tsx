import type { FieldValues } from 'react-hook-form';
import type { PlanSectionForm } from '@/components/studies/use-plan-section';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatInstant } from '@/lib/format';
import { compareSections } from '@/lib/studies/rules';
import type { PlanSection } from '@/lib/studies/schema';

interface SectionNoticesProps<Typed extends FieldValues> {
  section: PlanSection;
  state: PlanSectionForm<Typed>;
}

/** What a section has to say before it is worked on: typing kept from before, somebody else's save, a dropped line. */
export function SectionNotices<Typed extends FieldValues>({ section, state }: SectionNoticesProps<Typed>) {
  return (
    <div className="space-y-3 empty:hidden [&:not(:empty)]:mb-5">
      {state.kept && (
        <Notice
          title="Typed before and not saved"
          action={
            <>
              <Button variant="second" size="small" onClick={state.takeUpKept}>
                Take it up again
              </Button>
              <Button variant="quiet" size="small" onClick={state.dropKept}>
                Drop it
              </Button>
            </>
          }
        >
          Kept on this device on {formatInstant(state.kept.keptAt)} UTC.
        </Notice>
      )}
      {state.conflict && <Conflict section={section} state={state} />}
      {state.failure && (
        <Notice tone="stop" live title="Not saved">
          {state.failure}
        </Notice>
      )}
    </div>
  );
}

function Conflict<Typed extends FieldValues>({ section, state }: SectionNoticesProps<Typed>) {
  const { conflict } = state;
  if (!conflict) return null;
  const differences = compareSections(section, conflict.value, state.value);
  return (
    <Notice
      tone="caution"
      live
      title={`${conflict.savedBy} saved this section while you were typing`}
      action={
        <>
          <Button size="small" pending={state.isSaving} onClick={() => void state.keepMine()}>
            Keep mine
          </Button>
          <Button variant="second" size="small" onClick={state.takeTheirs}>
            Take theirs
          </Button>
        </>
      }
    >
      <Table dense caption="Where the two differ">
        <TableHead>
          <Row>
            <HeadCell>Field</HeadCell>
            <HeadCell>
              {conflict.savedBy}, {formatInstant(conflict.savedAt)}
            </HeadCell>
            <HeadCell>You</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {differences.map((difference) => (
            <Row key={difference.field}>
              <RowHead>{difference.label}</RowHead>
              <Cell>{difference.old}</Cell>
              <Cell className="font-600">{difference.new}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </Notice>
  );
}
