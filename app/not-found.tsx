import { PageFrame } from '@/components/shell/page-frame';
import { RunningHead } from '@/components/shell/running-head';
import { ButtonLink } from '@/components/ui/button-link';
import { EmptyState } from '@/components/ui/empty-state';

/** The same words for what is not there and for what belongs to somebody else. */
export default function NotFound() {
  return (
    <>
      <RunningHead />
      <PageFrame forecast={false}>
        <EmptyState
          title="There is nothing here"
          action={
            <ButtonLink variant="second" href="/">
              Go to the first page
            </ButtonLink>
          }
        >
          <p>The address may be mistyped, or the page is not open to you. Whoever sent you here can say which.</p>
        </EmptyState>
      </PageFrame>
    </>
  );
}
