import type { Metadata } from 'next';
import { DatesMethod } from '@/components/method/dates';
import { EnrolmentMethod } from '@/components/method/enrolment';
import { EventsMethod } from '@/components/method/events';
import { MethodLimits, PlanningMethod, PracticeMethod, ChecksMethod } from '@/components/method/practice';
import { PageFrame } from '@/components/shell/page-frame';
import { PageHead } from '@/components/ui/page-head';

export const metadata: Metadata = { title: 'Method' };

export default function MethodPage() {
  return (
    <PageFrame>
      <PageHead
        title="How the dates are computed"
        lead={
          <p className="max-w-measure">
            Thousands of futures of one trial are drawn from what is known of it, each as a whole. A date’s range is
            what those futures agree on. All methods are published; the sources stand under each part.
          </p>
        }
      />
      <EnrolmentMethod />
      <EventsMethod />
      <DatesMethod />
      <PracticeMethod />
      <ChecksMethod />
      <PlanningMethod />
      <MethodLimits />
    </PageFrame>
  );
}
