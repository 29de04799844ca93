import type { Band, Forecast } from '@/lib/domain/types';
import { dotplotText } from '@/lib/domain/words';
import { type Dot, layoutDotplot, type SlipScale } from './dotplot';
import { glue } from './glue';

interface DotplotProps {
  forecast: Forecast;
  band: Band;
  scale: SlipScale;
}

const DOT_CLASS = { below: 'dot-below', band: 'dot-band', above: 'dot-above' } as const;
const BAR_HEIGHT: Record<string, number> = { '0.95': 3, '0.8': 8, '0.5': 14 };
const TICK_TEXT_Y = 24;
const BARS_Y = 45;

/**
 * 20 equally likely outcomes over the band, with the graded intervals under the axis. Drawn on the server; the island draws it
 * again with the same code. Under the band: rings. In it: discs. Over it: diamonds.
 */
export function Dotplot({ forecast, band, scale }: DotplotProps) {
  const plot = layoutDotplot(forecast, band, scale);
  const right = plot.width - 2;
  return (
    <figure className="dotplot">
      <svg
        viewBox={`0 0 ${plot.width} ${plot.height}`}
        role="img"
        aria-label="Dotplot of slip over the band, in words below"
      >
        <rect className="area-band" x={plot.band.x} y={2} width={plot.band.width} height={plot.axisY - 2} />
        {plot.dots.map((dot) => (
          <DotMark key={`${dot.x}/${dot.y}`} dot={dot} radius={plot.radius} />
        ))}
        <path className="axis" d={`M2 ${plot.axisY}H${right}`} />
        {plot.ticks.map((tick) => (
          <g key={tick.label}>
            <path className="axis" d={`M${tick.x} ${plot.axisY}v${tick.edge ? 7 : 4}`} />
            <text
              className={tick.edge ? 'axis-text dotplot-edge' : 'axis-text'}
              x={tick.x}
              y={plot.axisY + TICK_TEXT_Y}
              textAnchor="middle"
            >
              {tick.label}
            </text>
          </g>
        ))}
        {plot.bars.map((bar) => (
          <rect
            key={bar.share}
            className={`dotplot-bar dotplot-bar-${bar.share * 100}`}
            x={bar.x}
            width={bar.width}
            y={plot.axisY + BARS_Y - BAR_HEIGHT[String(bar.share)]! / 2}
            height={BAR_HEIGHT[String(bar.share)]}
          />
        ))}
        <path className="dotplot-median" d={`M${plot.medianX} ${plot.axisY + BARS_Y - 12}v24`} />
        <path className="dotplot-median-cut" d={`M${plot.medianX} ${plot.axisY + BARS_Y - 9}v18`} />
      </svg>
      <figcaption>{glue(caption(forecast, band, scale, plot.beyond))}</figcaption>
    </figure>
  );
}

function DotMark({ dot, radius: r }: { dot: Dot; radius: number }) {
  const className = DOT_CLASS[dot.zone];
  if (dot.zone !== 'above') return <circle className={className} cx={dot.x} cy={dot.y} r={r - 1} />;
  return <path className={className} d={`M${dot.x} ${dot.y - r}l${r} ${r}l${-r} ${r}l${-r} ${-r}z`} />;
}

function caption(forecast: Forecast, band: Band, scale: SlipScale, beyond: number): string {
  const text = `${dotplotText(forecast, band)} The bar holds 50, 80 and 95 % of them.`;
  if (beyond === 0) return text;
  return `${text} ${beyond} drawn at the right end ${beyond === 1 ? 'lies' : 'lie'} beyond ${Math.round(scale.highPct)} %.`;
}
