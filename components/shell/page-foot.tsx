import { DEFERRAL_SENTENCE, DEMONSTRATION_SENTENCE } from '@/lib/cautions';

interface PageFootProps {
  /** A page that shows no forecast (a coordinator's month) leaves the deferral out. */
  forecast?: boolean;
  /** Demonstration studies say that they are one. */
  demonstration?: boolean;
}

export function PageFoot({ forecast = true, demonstration = false }: PageFootProps) {
  return (
    <footer className="mt-8 grid gap-x-13 gap-y-3 rule-double-t pt-3 text-13 text-ink-soft md:mt-13 md:grid-cols-[7fr_4fr]">
      {forecast && <p>{DEFERRAL_SENTENCE}</p>}
      {demonstration && <p>{DEMONSTRATION_SENTENCE}</p>}
    </footer>
  );
}
