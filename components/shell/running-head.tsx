import Link from 'next/link';
import type { ReactNode } from 'react';
import { ThemeSwitch } from '@/components/shell/theme-switch';

export interface HeadLink {
  label: string;
  href: string;
  current?: boolean;
}

interface RunningHeadProps {
  /** The organisation, the sponsor or the site on whose behalf one is here. */
  organisation?: string;
  links?: readonly HeadLink[];
  person?: { name: string; role: string; href?: string };
  /** A form or a button that signs out. */
  signOut?: ReactNode;
  homeHref?: string;
}

/** The printed line at the top of each leaf. */
export function RunningHead({ organisation, links = [], person, signOut, homeHref = '/' }: RunningHeadProps) {
  const named = person && (
    <>
      {person.name}
      <span className="hidden sm:inline">, {person.role}</span>
    </>
  );
  return (
    <header className="rule-double-b">
      <a
        href="#content"
        className="sr-only focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-50 focus:bg-paper focus:px-3 focus:py-2"
      >
        Skip to the content
      </a>
      <div className="flex flex-wrap items-baseline gap-x-5 px-4 pt-2.5 pb-[7px] md:px-8 md:pt-3.5 md:pb-[9px]">
        <Link href={homeHref} className="font-title text-24 leading-7 font-500 tracking-[-0.01em] no-underline">
          Kalends
        </Link>
        {organisation && <span className="hidden text-ink-soft md:inline">{organisation}</span>}
        <nav aria-label="Account" className="ml-auto flex flex-wrap items-baseline gap-x-5 gap-y-1 text-13">
          {links.map((link) => (
            <Link
              key={link.href}
              href={link.href}
              aria-current={link.current ? 'page' : undefined}
              className="no-underline hover:underline aria-[current]:font-600"
            >
              {link.label}
            </Link>
          ))}
          {person?.href ? (
            <Link href={person.href} className="no-underline hover:underline">
              {named}
            </Link>
          ) : (
            named && <span>{named}</span>
          )}
          {signOut}
          <ThemeSwitch />
        </nav>
      </div>
    </header>
  );
}
