import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { ForecastFigure } from '@/components/charts/forecast-figure';
import { firstReading, movedReading, nearestReading, readingsOf } from '@/components/charts/figure-readings';
import { endOfDay } from '@/components/charts/figure-scale';
import { fixtureForecast } from './figure-fixture';

const data = fixtureForecast({ draws: 600 });
const readings = readingsOf(data);

describe('reading months out', () => {
  it('goes from the first observed month-end to the last forecast one, each once', () => {
    const months = readings.map((reading) => reading.monthEnd.slice(0, 7));
    expect(new Set(months).size).toBe(months.length);
    expect([...months].sort()).toEqual(months);
    expect(readings.find((reading) => reading.monthEnd === data.cutoff)?.observed).toBe(true);
    expect(readings[readings.length - 1]?.monthEnd).toBe(data.monthly[data.monthly.length - 1]?.monthEnd);
  });

  it('says what was counted by an observed month-end', () => {
    const atCutoff = readings.find((reading) => reading.monthEnd === data.cutoff);
    expect(atCutoff?.randomised).toEqual({ median: 658, band: null });
    expect(atCutoff?.events).toEqual({ median: 86, band: null });
  });

  it('starts at the next planned date', () => {
    expect(readings[firstReading(data, readings)]?.monthEnd).toBe('2027-09-30');
  });

  it.each([
    ['ArrowRight', 5, 6],
    ['ArrowLeft', 5, 4],
    ['PageUp', 5, 17],
    ['PageDown', 5, 0],
    ['Home', 5, 0],
    ['End', 5, 19],
    ['ArrowRight', 19, 19],
  ])('%s from %d leads to %d of 20', (key, from, to) => expect(movedReading(key, from, 20)).toBe(to));

  it('leaves other keys to the page', () => expect(movedReading('Tab', 5, 20)).toBeNull());

  it('takes the month-end nearest to the pointer', () => {
    expect(readings[nearestReading(readings, endOfDay('2027-06-28'))]?.monthEnd).toBe('2027-06-30');
    expect(nearestReading(readings, -1e6)).toBe(0);
  });
});

describe('the figure’s markup', () => {
  const html = renderToStaticMarkup(<ForecastFigure {...data} cautionMarks={{ IA: '†\u00a0§' }} />);

  it('is one tab stop with one status line', () => {
    expect(html.match(/tabindex="0"/g)).toHaveLength(1);
    expect(html.match(/role="status"/g)).toHaveLength(1);
    expect(html).toContain('role="slider"');
  });

  it('says every milestone in words, range first', () => {
    expect(html).toMatch(/Interim analysis: [^.]* to [^.]*2028 \(80\u00a0%\), median /);
  });

  it('puts the caution marks beside the date', () =>
    expect(html).toMatch(/median [^<]*<tspan class="noted" dx="5">†\u00a0§/));

  it('draws no number that is none', () => {
    expect(html).not.toMatch(/NaN|Infinity|undefined/);
    const nothing = renderToStaticMarkup(
      <ForecastFigure cutoff="2027-03-31" observed={[]} monthly={[]} milestones={[]} />,
    );
    expect(nothing).not.toMatch(/NaN|Infinity|undefined/);
    const compact = renderToStaticMarkup(<ForecastFigure {...data} observed={[]} plan={undefined} compact />);
    expect(compact).not.toMatch(/NaN|Infinity|undefined|role="status"/);
  });
});
