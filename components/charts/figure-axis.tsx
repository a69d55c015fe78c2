import { half, labelStep, monthTicks, px, yearLabels } from '@/components/charts/figure-scale';
import type { Frame } from '@/components/charts/figure-frame';
import { formatShortMonth } from '@/lib/format';

/** Years over the figure with their hairlines; ticks under every panel; months written once, at the foot. */
export function FigureAxis({ frame }: { frame: Frame }) {
  const { scale, axisY, patients, events, size } = frame;
  const ticks = monthTicks(scale);
  const step = labelStep(scale, size === 'full' ? 36 : 44);
  const bases = [...new Set([patients.base, ...(events ? [events.base] : []), axisY])];
  const monthWide = scale.pixelsPerDay * 30.4375;
  const quarter = (month: number): boolean => month % 3 === 1;
  const drawn = ticks.filter((tick) => monthWide >= 4 || (monthWide >= 1.5 ? quarter(tick.month) : tick.month === 1));
  const tickPath = (base: number): string =>
    drawn.map((tick) => `M${half(tick.x)} ${base}v${quarter(tick.month) ? 7 : 3}`).join('');
  return (
    <g aria-hidden="true">
      {yearLabels(scale).map((label) => (
        <g key={label.year}>
          {label.rule && <path d={`M${half(label.x)} 4V${axisY}`} className="hairline" />}
          <text x={px(label.x + (label.rule ? 6 : 0))} y={18} className="year">
            {label.year}
          </text>
        </g>
      ))}
      {bases.map((base) => (
        <path
          key={base}
          d={`M${px(scale.left)} ${half(base + 0.5)}H${px(scale.right)}${tickPath(base)}`}
          className="tickline"
        />
      ))}
      {ticks
        .filter((tick) => (tick.month - 1) % step === 0 && step < 12 && tick.x + 22 <= frame.width)
        .map((tick) => (
          <text key={`${tick.year}-${tick.month}`} x={px(tick.x)} y={axisY + 22} className="soft">
            {formatShortMonth(`${tick.year}-${String(tick.month).padStart(2, '0')}`)}
          </text>
        ))}
    </g>
  );
}
