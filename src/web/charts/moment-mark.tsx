import type { VNode } from 'preact';
import type { SectionMoment } from '../../assessment/assessment.js';
import { markPlace } from '../islands/moments.js';
import { timeAxis, type CurveSize } from './curve-scale.js';
import type { ZoneCurve } from './zone-curve.js';

/** The chosen moment as a line over the picture of a curve; hidden where the curve has no such time. */
export function MomentMark(props: {
  readonly curve: ZoneCurve;
  readonly caseName: string;
  readonly size: CurveSize;
  readonly name: string;
  readonly moment: SectionMoment | null;
}): VNode {
  const { curve, caseName, size, name, moment } = props;
  const axis = timeAxis(curve, size);
  const plot = { left: size.left, right: size.width - size.right };
  const place =
    moment?.caseName === caseName
      ? markPlace(moment.atS, { fromS: axis.from, toS: axis.to, ...plot })
      : null;
  return (
    <svg
      class={`moment-mark ${name}`}
      viewBox={`0 0 ${String(size.width)} ${String(size.height)}`}
      aria-hidden="true"
      data-case={caseName}
      data-from={String(axis.from)}
      data-to={String(axis.to)}
      data-left={String(plot.left)}
      data-right={String(plot.right)}
      hidden={place === null}
    >
      <line
        x1={String(place ?? 0)}
        x2={String(place ?? 0)}
        y1={String(size.top)}
        y2={String(size.height - size.bottom)}
        stroke-width="2.5"
      />
    </svg>
  );
}
