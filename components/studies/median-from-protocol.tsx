import { useState } from 'react';
import { Button } from '@/components/ui/button';
import { NumberField } from '@/components/ui/number-field';
import { numberTyped } from '@/components/ui/number-typed';
import { pooledMedianMonths } from '@/lib/engine/plan';

interface MedianFromProtocolProps {
  /** The pooled median, to one decimal, as it would be typed. */
  onMedian: (months: string) => void;
}

/**
 * A protocol plans with a control median and a hazard ratio; a blinded forecast knows all patients together. Their median
 * is that of the mixture, not a weighted mean. What is typed here is not stored.
 */
export function MedianFromProtocol({ onMedian }: MedianFromProtocolProps) {
  const [control, setControl] = useState('');
  const [ratio, setRatio] = useState('');
  const [allocation, setAllocation] = useState('1');
  const figures = [control, ratio, allocation].map(numberTyped);
  const [controlMedianMonths, hazardRatio, allocationRatio] = figures;
  const complete = figures.every((figure) => figure !== null && Number.isFinite(figure) && figure > 0);
  const median =
    complete && controlMedianMonths && hazardRatio && allocationRatio
      ? pooledMedianMonths({ controlMedianMonths, hazardRatio, allocationRatio }).toFixed(1)
      : null;
  return (
    <div className="mt-3 border-y border-rule bg-paper-sunk px-5 py-3">
      <div className="grid items-start gap-3 sm:grid-cols-3">
        <NumberField
          label="Control group’s median"
          unit="months"
          value={control}
          onChange={(event) => setControl(event.target.value)}
        />
        <NumberField
          label="Hazard ratio"
          hint="As planned, for example 0.7."
          value={ratio}
          onChange={(event) => setRatio(event.target.value)}
        />
        <NumberField
          label="Allocation"
          unit="to 1 control"
          value={allocation}
          onChange={(event) => setAllocation(event.target.value)}
        />
      </div>
      <div role="status" className="mt-3 flex flex-wrap items-center gap-3">
        {median ? (
          <>
            <span>
              All patients together: <b>{median} months</b>.
            </span>
            <Button variant="second" size="small" onClick={() => onMedian(median)}>
              Use {median} months
            </Button>
          </>
        ) : (
          <span className="text-13 text-ink-soft">
            Three figures above 0 give the median of all patients together. None of them is stored.
          </span>
        )}
      </div>
    </div>
  );
}
