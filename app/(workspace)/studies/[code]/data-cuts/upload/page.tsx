import type { Metadata } from 'next';
import { CutUpload } from '@/components/data-cuts/cut-upload';
import { TotalsForm } from '@/components/data-cuts/totals-form';
import { NoPermission } from '@/components/shell/no-permission';
import { Disclosure } from '@/components/ui/disclosure';
import { PageHead } from '@/components/ui/page-head';
import { calendarDay, systemClock } from '@/lib/clock';
import { lastEndedMonth, monthEnd } from '@/lib/dates';
import { formatCount } from '@/lib/format';
import { readStudy } from '@/lib/http/page';
import { BLINDING_SENTENCE } from '@/lib/study-file/arm-columns';
import { MOST_SUBJECTS } from '@/lib/subject-listings/schema';

export const metadata: Metadata = { title: 'Upload a data cut' };

export default async function UploadCutPage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params;
  const read = await readStudy(code, 'data-cuts:accept', async () => null);
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const lastMonthEnd = monthEnd(lastEndedMonth(calendarDay(systemClock.now())));
  return (
    <>
      <PageHead
        path={[
          { label: code, href: `/studies/${code}` },
          { label: 'Data cuts', href: `/studies/${code}/data-cuts` },
          { label: 'Upload' },
        ]}
        title="Upload a data cut"
        lead={
          <div className="max-w-measure space-y-1">
            <p>
              The blinded subject listing as CSV, at most 10 MB and {formatCount(MOST_SUBJECTS)} rows. Columns: subject,
              site, randomised on, status (event, event-pending, withdrawn, completed or at-risk) and status on; or
              those of ADaM: STUDYID, USUBJID, SITEID, STARTDT, ADT, CNSR and EVNTDESC. Dates like 2027-03-14 or 14 Mar
              2027.
            </p>
            <p>{BLINDING_SENTENCE} A file with such a column is refused.</p>
          </div>
        }
      />
      <CutUpload code={code} lastMonthEnd={lastMonthEnd} />
      <Disclosure title="Give totals instead of a listing" className="mt-8 md:mt-13">
        <p className="mt-3 max-w-measure text-ink-soft">
          With totals only a constant hazard can be forecast (the exponential), because nobody knows who has been at
          risk for how long.
        </p>
        <TotalsForm code={code} lastMonthEnd={lastMonthEnd} />
      </Disclosure>
    </>
  );
}
