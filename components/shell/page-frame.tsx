import type { ReactNode } from 'react';
import { PageFoot } from '@/components/shell/page-foot';

interface PageFrameProps {
  /** The study's sections; without it the page is one leaf. */
  rail?: ReactNode;
  forecast?: boolean;
  demonstration?: boolean;
  children: ReactNode;
}

/** A slim list of contents and one column of at most 1,120 px; its foot closes every page. */
export function PageFrame({ rail, forecast, demonstration, children }: PageFrameProps) {
  const content = (
    <main id="content" tabIndex={-1} className="min-w-0 pt-3 outline-none md:pt-5">
      {children}
      <PageFoot forecast={forecast} demonstration={demonstration} />
    </main>
  );
  if (!rail) return <div className="mx-auto max-w-leaf px-4 pb-8 md:px-8 md:pb-13">{content}</div>;
  return (
    <div className="justify-center gap-x-9 px-4 pb-8 md:grid md:grid-cols-[172px_minmax(0,70rem)] md:px-8 md:pb-13">
      {rail}
      {content}
    </div>
  );
}
