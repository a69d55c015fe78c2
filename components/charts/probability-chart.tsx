'use client';

import { CartesianGrid, Line, LineChart, ReferenceLine, ResponsiveContainer, XAxis, YAxis } from 'recharts';
import { formatPercent } from '@/lib/format';

export interface ProbabilityChartProps {
  points: readonly { x: number; probability: number }[];
  /** The chance that is wished for. */
  wished: number;
  /** What the x-axis counts. */
  xLabel: string;
  /** What the curve says, for those who hear it. */
  description: string;
}

/** A plain curve of a probability against a number (sites needed). Loaded only where shown: see `lazy-probability-chart`. */
export function ProbabilityChart({ points, wished, xLabel, description }: ProbabilityChartProps) {
  const tick = { fill: 'var(--ink-soft)', fontSize: 13 };
  return (
    <div>
      <div role="img" aria-label={description} className="h-60 text-13">
        <ResponsiveContainer width="100%" height="100%">
          <LineChart data={[...points]} margin={{ top: 12, right: 12, bottom: 0, left: 0 }} accessibilityLayer={false}>
            <CartesianGrid vertical={false} stroke="var(--rule)" />
            <XAxis
              dataKey="x"
              type="number"
              domain={['dataMin', 'dataMax']}
              allowDecimals={false}
              tick={tick}
              stroke="var(--rule-strong)"
            />
            <YAxis
              domain={[0, 1]}
              ticks={[0, 0.5, 1]}
              tickFormatter={(share: number) => formatPercent(share)}
              tick={tick}
              tickLine={false}
              axisLine={false}
              width={56}
            />
            <ReferenceLine
              y={wished}
              stroke="var(--ink)"
              label={{ value: formatPercent(wished), position: 'insideTopLeft', fill: 'var(--ink)', fontSize: 13 }}
            />
            <Line
              dataKey="probability"
              stroke="var(--patients)"
              strokeWidth={1.5}
              isAnimationActive={false}
              activeDot={false}
              dot={{ r: 3, fill: 'var(--paper)', stroke: 'var(--patients)' }}
            />
          </LineChart>
        </ResponsiveContainer>
      </div>
      <p className="text-right text-13 text-ink-soft">{xLabel}</p>
    </div>
  );
}
