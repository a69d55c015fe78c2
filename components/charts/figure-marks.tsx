import { px } from '@/components/charts/figure-scale';
import type { Bracket } from '@/components/charts/milestone-layout';
import type { MilestoneKind } from '@/lib/engine/types';

export type Tone = 'randomised' | 'events' | 'date';

export function toneOf(kind: MilestoneKind): Tone {
  return kind === 'randomised' || kind === 'events' ? kind : 'date';
}

interface PointMarkProps {
  tone: Tone;
  x: number;
  y: number;
  size?: number;
  open?: boolean;
}

/** Disc for patients, square for events, triangle for a date without a count. */
export function PointMark({ tone, x, y, size = 4.5, open = false }: PointMarkProps) {
  const className = open ? 'mark-open' : 'mark';
  if (tone === 'randomised') return <circle cx={px(x)} cy={px(y)} r={size} className={className} />;
  if (tone === 'events') {
    const side = size * 1.87;
    return <rect x={px(x - side / 2)} y={px(y - side / 2)} width={px(side)} height={px(side)} className={className} />;
  }
  const reach = size * 1.1;
  return (
    <path
      d={`M${px(x)} ${px(y - reach)}L${px(x + reach)} ${px(y + reach * 0.8)}H${px(x - reach)}Z`}
      className={className}
    />
  );
}

/** The open diamond of a planned day. */
export function PlannedMark({ x, y, size = 5.5 }: { x: number; y: number; size?: number }) {
  return (
    <path
      d={`M${px(x)} ${px(y - size)}L${px(x + size)} ${px(y)}L${px(x)} ${px(y + size)}L${px(x - size)} ${px(y)}Z`}
      className="plan-mark"
    />
  );
}

interface BracketMarkProps {
  tone: Tone;
  bracket: Bracket;
  /** The line that it hangs under. */
  y: number;
  drop?: number;
}

/** Heavy for patients, double for events, single for a date: told apart without colour. Open where its late end never comes. */
export function BracketMark({ tone, bracket, y, drop = 11 }: BracketMarkProps) {
  const top = y + drop - 6;
  const low = y + drop;
  const close = bracket.open ? '' : `V${px(top)}`;
  return (
    <>
      <path
        d={`M${px(bracket.from)} ${px(top)}V${px(low)}H${px(bracket.to)}${close}`}
        className="bracket"
        style={tone === 'randomised' ? { strokeWidth: 2.25 } : undefined}
      />
      {tone === 'events' && (
        <path
          d={`M${px(bracket.from)} ${px(low + 3)}H${px(bracket.to)}`}
          className="bracket"
          style={{ strokeWidth: 1 }}
        />
      )}
    </>
  );
}

/** The hill of a date's distribution on an opaque ground, its 80 % core darker. */
export function Hill({ outline, core }: { outline: string; core: string }) {
  if (!outline) return null;
  return (
    <>
      <path d={`${outline}Z`} className="hill-ground" />
      <path d={`${outline}Z`} className="hill" />
      {core && <path d={`${core}Z`} className="hill-core" />}
      <path d={outline} className="hill-edge" />
    </>
  );
}
