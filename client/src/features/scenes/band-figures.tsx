import type { Band, Scene } from '../../../../shared/contracts/scene.ts';
import { BAND_ROLE_NAME } from '../../../../shared/constants/bands.ts';
import { formatNumber, formatPercent } from '../../lib/format.ts';
import { formatShort } from './scene-text.ts';

const HEADS = ['Valid pixels', 'Nodata', 'Lowest', 'Highest', 'Mean', '1 σ', '2 %', '98 %'];

/** Statistics of each band's valid pixels, in stored values or in what they stand for. */
export function BandFigures({ scene, isScaled }: { scene: Scene; isScaled: boolean }) {
  return (
    <div className="overflow-x-auto">
      <table aria-label="Band statistics" className="w-full min-w-[52rem] border-separate border-spacing-0 text-sm">
        <thead>
          <tr className="text-xs text-ink-soft">
            <th scope="col" className="border-b border-edge py-1.5 pr-3 text-left font-medium">
              Band
            </th>
            {HEADS.map((head) => (
              <th key={head} scope="col" className="border-b border-edge py-1.5 pl-3 text-right font-medium">
                {head}
              </th>
            ))}
            <th scope="col" className="border-b border-edge py-1.5 pl-5 text-left font-medium">
              Stored as
            </th>
          </tr>
        </thead>
        <tbody>
          {scene.bands.map((band) => (
            <FigureRow key={band.id} band={band} isScaled={isScaled} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

function FigureRow({ band, isScaled }: { band: Band; isScaled: boolean }) {
  const { validPixels, nodataPixels, min, max, mean, standardDeviation, p2, p98 } = band.statistics;
  const { scale, offset } = isScaled ? band : { scale: 1, offset: 0 };
  const decimals = decimalsOf(band, isScaled);
  const value = (stored: number) => formatNumber(stored * scale + offset, decimals);
  // A scale below zero turns the order of values around.
  const [lowest, highest] = scale < 0 ? [max, min] : [min, max];
  const [low, high] = scale < 0 ? [p98, p2] : [p2, p98];
  const figures = [
    formatNumber(validPixels),
    formatPercent(nodataPixels / Math.max(1, validPixels + nodataPixels), 1),
    ...[lowest, highest, mean].map(value),
    formatNumber(standardDeviation * Math.abs(scale), decimals === 0 ? 1 : decimals),
    ...[low, high].map(value),
  ];
  return (
    <tr>
      <th scope="row" className="border-b border-line py-1.5 pr-3 text-left font-normal">
        <span className="text-ink-soft">{band.number}</span> {band.name}
        {band.role !== 'other' && band.name !== BAND_ROLE_NAME[band.role] && (
          <span className="text-ink-soft"> · {BAND_ROLE_NAME[band.role]}</span>
        )}
      </th>
      {figures.map((figure, index) => (
        <td key={HEADS[index]} className="border-b border-line py-1.5 pl-3 text-right whitespace-nowrap">
          {figure}
        </td>
      ))}
      <td className="border-b border-line py-1.5 pl-5 whitespace-nowrap text-ink-soft">
        {band.dataType}, {formatNumber(band.width)} × {formatNumber(band.height)}
        {band.nodata !== null && `, nodata ${formatShort(band.nodata)}`}
      </td>
    </tr>
  );
}

/** Decimals that keep a band's figures apart: as the quantity is read, or as finely as small stored values need. */
function decimalsOf({ quantity, statistics }: Band, isScaled: boolean): number {
  if (isScaled && quantity === 'reflectance') return 4;
  if (isScaled && quantity === 'kelvin') return 2;
  return statistics.max - statistics.min < 10 ? 4 : 0;
}
