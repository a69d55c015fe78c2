import { FigureMilestone, FigureMilestoneWords } from '@/components/charts/figure-milestone';
import { PointMark } from '@/components/charts/figure-marks';
import { px } from '@/components/charts/figure-scale';
import type { Frame } from '@/components/charts/figure-frame';
import type { PanelLayout } from '@/components/charts/panel-layout';

interface FigurePanelProps {
  panel: PanelLayout;
  frame: Frame;
}

/** One panel's curves: the plan, the bands month by month, what was observed. */
export function FigurePanel({ panel, frame }: FigurePanelProps) {
  const small = frame.size === 'small';
  return (
    <g className={`tone-${panel.kind}`}>
      {panel.countLabels.map((label) => (
        <text
          key={label.text}
          x={px(frame.scale.left - 8)}
          y={px(label.y + 4.5)}
          textAnchor="end"
          className={label.bold ? 'strong' : 'soft'}
          aria-hidden="true"
        >
          {label.text}
        </text>
      ))}
      {panel.plan && <path d={panel.plan} className="planline" />}
      {panel.band80.map((slice) => (
        <path key={slice.d} d={slice.d} className="band-80" style={{ opacity: slice.opacity.toFixed(2) }} />
      ))}
      {panel.band50.map((slice) => (
        <path key={slice.d} d={slice.d} className="band-50" style={{ opacity: slice.opacity.toFixed(2) }} />
      ))}
      {panel.edges80.map((edge, place) => (
        <path key={place} d={edge} className="edge-80" />
      ))}
      {panel.edges95.map((edge, place) => (
        <path key={place} d={edge} className="edge-95" />
      ))}
      {panel.earlierEdges.map((edge, place) => (
        <path key={place} d={edge} className="planline" />
      ))}
      <path d={panel.median} className="medianline" />
      {panel.kind === 'events' ? (
        <>
          <path d={panel.observed} className="observed-outer" />
          <path d={panel.observed} className="observed-inner" />
        </>
      ) : (
        <path d={panel.observed} className="observed" />
      )}
      {!small &&
        panel.quarterMarks.map((mark) => <PointMark key={mark.x} tone={panel.kind} x={mark.x} y={mark.y} size={3.4} />)}
      {small &&
        panel.quarterMarks
          .slice(-1)
          .map((mark) => <PointMark key={mark.x} tone={panel.kind} x={mark.x} y={mark.y} size={3.4} />)}
    </g>
  );
}

export function FigurePanelMilestones({ panel, frame }: FigurePanelProps) {
  return panel.milestones.map((milestone) => (
    <FigureMilestone key={milestone.code} milestone={milestone} frame={frame} />
  ));
}

/** Words last, so that no line runs over them. */
export function FigurePanelWords({ panel }: { panel: PanelLayout }) {
  return (
    <g className={`tone-${panel.kind}`}>
      {panel.milestones.map((milestone) => (
        <FigureMilestoneWords key={milestone.code} milestone={milestone} />
      ))}
      {panel.now && (
        <text x={px(panel.now.x)} y={px(panel.now.y)} textAnchor={panel.now.anchor} className="rimmed strong toned">
          {panel.now.text}
        </text>
      )}
    </g>
  );
}
