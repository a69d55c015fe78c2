import { useId, type ReactNode } from 'react';

export interface RangeFieldProps {
  label: ReactNode;
  value: number;
  min: number;
  max: number;
  step?: number;
  /** The value of the comparison's base, marked by a tick under the track. */
  base?: number;
  /** How the value reads aloud, e.g. "8 sites". */
  valueText?: string;
  hint?: ReactNode;
  onChange: (value: number) => void;
}

/** A slider. Arrows step by one step, the Page keys by ten. */
export function RangeField({ label, value, min, max, step = 1, base, valueText, hint, onChange }: RangeFieldProps) {
  const id = useId();
  const clamp = (wished: number): number => Math.min(max, Math.max(min, wished));
  const share = base === undefined ? null : (clamp(base) - min) / (max - min || 1);
  return (
    <div>
      <label htmlFor={id} className="mb-1 block text-13 font-600">
        {label}
      </label>
      <div className="relative">
        <input
          id={id}
          type="range"
          min={min}
          max={max}
          step={step}
          value={value}
          aria-valuetext={valueText}
          aria-describedby={hint ? `${id}-hint` : undefined}
          className="range-track"
          onChange={(event) => onChange(Number(event.target.value))}
          onKeyDown={(event) => {
            const leap = { PageUp: 10, PageDown: -10 }[event.key];
            if (leap === undefined) return;
            event.preventDefault();
            onChange(clamp(value + leap * step));
          }}
        />
        {share !== null && (
          <span
            aria-hidden="true"
            className="absolute bottom-0 h-1.5 w-px bg-ink"
            style={{ left: `calc(${share * 100}% + ${(0.5 - share) * 12}px)` }}
          />
        )}
      </div>
      {hint && (
        <p id={`${id}-hint`} className="mt-1 text-13 text-ink-soft">
          {hint}
        </p>
      )}
    </div>
  );
}
