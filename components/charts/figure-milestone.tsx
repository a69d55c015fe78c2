import { BracketMark, Hill, PlannedMark, PointMark, toneOf } from '@/components/charts/figure-marks';
import { half, px } from '@/components/charts/figure-scale';
import type { Frame } from '@/components/charts/figure-frame';
import type { MilestoneLayout } from '@/components/charts/milestone-layout';

/** A milestone's line, hill, bracket and marks. Its words are drawn later, over everything. */
export function FigureMilestone({ milestone, frame }: { milestone: MilestoneLayout; frame: Frame }) {
  const tone = toneOf(milestone.kind);
  const { scale, measures } = frame;
  const { y, bracket, earlier } = milestone;
  return (
    <g className={`tone-${tone}`}>
      <path
        d={`M${px(scale.left)} ${half(y + 0.5)}H${px(scale.right)}`}
        className={tone === 'date' ? 'tickline' : 'inkline'}
      />
      {milestone.hill && <Hill {...milestone.hill} />}
      {earlier?.outline && <path d={earlier.outline} className="planline" />}
      {earlier?.bracket && (
        <path
          d={`M${px(earlier.bracket.from)} ${px(y + 17)}V${px(y + 22)}H${px(earlier.bracket.to)}${earlier.bracket.open ? '' : `V${px(y + 17)}`}`}
          className="planline"
          style={{ strokeDasharray: '3 2' }}
        />
      )}
      {bracket && <BracketMark tone={tone} bracket={bracket} y={y} />}
      {milestone.diamond && <PlannedMark {...milestone.diamond} />}
      {milestone.markX !== null && <PointMark tone={tone} x={milestone.markX} y={y + 0.5} size={measures.mark} />}
    </g>
  );
}

export function FigureMilestoneWords({ milestone }: { milestone: MilestoneLayout }) {
  const { name, label } = milestone;
  return (
    <g className={`tone-${toneOf(milestone.kind)}`}>
      {name && (
        <text x={px(name.x)} y={px(name.y)} className="rimmed">
          <tspan className="strong">{name.text}</tspan>
          {name.waitsFor && (
            <tspan className="soft" dx="6">
              {name.waitsFor}
            </tspan>
          )}
        </text>
      )}
      {label?.lines.map((line, place) => (
        <text
          key={line}
          x={px(label.x)}
          y={px(label.y + 17 * place)}
          textAnchor={label.anchor}
          className={place === 0 ? 'rimmed strong toned' : 'rimmed soft'}
        >
          {line}
          {label.marks && place === label.lines.length - 1 && (
            <tspan className="noted" dx="5">
              {label.marks}
            </tspan>
          )}
        </text>
      ))}
    </g>
  );
}
