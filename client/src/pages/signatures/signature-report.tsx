import { type ReactNode, useState } from 'react';
import { Link } from 'react-router-dom';
import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import { SpectralProfile } from '../../components/charts/spectral-profile.tsx';
import { Section, Statement } from '../../components/layout/reading-page.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import { Select } from '../../components/ui/select.tsx';
import { brushedSamples } from '../../features/signatures/brushed-samples.ts';
import { ClassHistograms } from '../../features/signatures/class-histograms.tsx';
import { classProfiles } from '../../features/signatures/class-profiles.ts';
import { ClassStanding } from '../../features/signatures/class-standing.tsx';
import { ClassToggles } from '../../features/signatures/class-toggles.tsx';
import { type Brush, FeatureScatter } from '../../features/signatures/feature-scatter.tsx';
import { PAIR_FIGURES, type PairFigure } from '../../features/signatures/pair-figures.ts';
import { RiskList } from '../../features/signatures/risk-list.tsx';
import { SeparabilityMatrix } from '../../features/signatures/separability-matrix.tsx';
import { formatCount } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** Samples opened on the map at a time; more do not fit an address. */
const MAX_OPENED = 40;

export interface SignatureReportProps {
  set: SignatureSet;
  sceneName: string;
  bandToggles: ReactNode;
}

/** The signatures read top-down: what is at risk, what lies behind it, and where samples are lacking. */
export function SignatureReport({ set, sceneName, bandToggles }: SignatureReportProps) {
  const { id } = useProject();
  const [figure, setFigure] = useState<PairFigure>('jeffriesMatusita');
  const [shown, setShown] = useState<ReadonlySet<number>>(() => new Set(set.classes.keys()));
  const [axes, setAxes] = useState(() => chooseAxes(set));
  const [brush, setBrush] = useState<Brush | null>(null);
  const options = set.features.map((feature, place) => ({
    value: String(place),
    label: feature.kind === 'band' ? `${feature.number} · ${feature.name}` : feature.name,
  }));
  const chosen = brush ? brushedSamples(set, axes, shown, brush) : [];
  const nLacking = set.classes.filter(({ remarks }) => remarks.length > 0).length;
  const setAxis = (axis: 'x' | 'y', place: string) => {
    setAxes({ ...axes, [axis]: Number(place) });
    setBrush(null);
  };
  return (
    <div className="space-y-9">
      <Statement above={`${formatCount(set.nSamples, 'sample')} in ${sceneName}`} below={describeOutside(set)}>
        {describeRisks(set.risks.length, nLacking)}
      </Statement>
      <div className="grid gap-9 xl:grid-cols-2">
        <Section title="Pairs at risk" note="From the classes’ means and spreads in the bands that count.">
          <RiskList set={set} onChoose={(first, second) => setShown(new Set([first, second]))} />
        </Section>
        <Section
          title="How far apart classes lie"
          action={
            <Segmented<PairFigure>
              label="Distance"
              value={figure}
              onChange={setFigure}
              options={Object.entries(PAIR_FIGURES).map(([value, { shortName }]) => ({
                value: value as PairFigure,
                label: shortName,
              }))}
            />
          }
        >
          <div className="mb-3">{bandToggles}</div>
          <SeparabilityMatrix set={set} figure={figure} />
        </Section>
      </div>
      <Section title="What the classes look like">
        <ClassToggles
          classes={set.classes}
          shown={shown}
          onChange={(next) => {
            setShown(next);
            setBrush(null);
          }}
        />
        <div className="mt-5 grid gap-9 xl:grid-cols-2">
          <SpectralProfile
            title="Mean spectra"
            note={shown.size > 3 ? 'Choose three classes or fewer to see their spread.' : 'Ribbons are ± 1 σ.'}
            series={classProfiles(set, shown)}
            plotHeight={300}
          />
          <div>
            <div className="mb-2 flex flex-wrap items-center gap-2 text-sm">
              <Select
                aria-label="Down"
                size="sm"
                className="w-auto! max-w-56"
                value={String(axes.y)}
                onChange={(place) => setAxis('y', place)}
                options={options}
              />
              by
              <Select
                aria-label="Across"
                size="sm"
                className="w-auto! max-w-56"
                value={String(axes.x)}
                onChange={(place) => setAxis('x', place)}
                options={options}
              />
            </div>
            <FeatureScatter set={set} {...axes} shown={shown} brush={brush} onBrush={setBrush} />
            <p role="status" className="mt-2 flex min-h-8 flex-wrap items-center gap-3 text-sm text-ink-soft">
              {brush
                ? formatCount(chosen.length, 'sample') + ' with pixels in the box.'
                : 'Drag over the plot to find samples on the map.'}
              {chosen.length > 0 && (
                <Link
                  to={paths.samplesChosen(id, chosen.slice(0, MAX_OPENED))}
                  className={buttonClass('secondary', 'sm')}
                >
                  {chosen.length > MAX_OPENED ? `Show the first ${MAX_OPENED} on the map` : 'Show on the map'}
                </Link>
              )}
            </p>
          </div>
        </div>
      </Section>
      <Section
        title="Spread of one band or index"
        action={
          <Select
            aria-label="Band or index"
            size="sm"
            className="w-auto! max-w-64"
            value={String(axes.x)}
            onChange={(place) => setAxis('x', place)}
            options={options}
          />
        }
      >
        <ClassHistograms set={set} feature={axes.x} shown={shown} />
      </Section>
      <Section title="Enough samples, well spread?">
        <ClassStanding set={set} deskPath={paths.samples(id)} />
      </Section>
    </div>
  );
}

/** Near infrared by red where a scene has them, the pair in which most covers part; otherwise its first two bands. */
function chooseAxes({ features }: SignatureSet): { x: number; y: number } {
  const near = (um: number) =>
    features.findIndex(
      (feature) => feature.centreWavelengthUm !== null && Math.abs(feature.centreWavelengthUm - um) < 0.06,
    );
  const [red, nir] = [near(0.66), near(0.85)];
  return red >= 0 && nir >= 0 ? { x: red, y: nir } : { x: 0, y: Math.min(1, features.length - 1) };
}

function describeRisks(nRisks: number, nLacking: number): string {
  const risks =
    nRisks === 0
      ? 'No two classes are likely to be confused'
      : `${nRisks === 1 ? 'One pair' : `${nRisks} pairs`} of classes may be confused`;
  if (nLacking === 0) return `${risks}, and no class lacks samples.`;
  return `${risks}; ${nLacking === 1 ? 'one class needs' : `${nLacking} classes need`} more or better spread samples.`;
}

function describeOutside({ nOutside }: SignatureSet): string {
  const what =
    'Figures describe the samples as drawn, and take classes as normally distributed where they say how far apart they lie.';
  return nOutside > 0
    ? `${formatCount(nOutside, 'sample')} of the project lies outside this scene and is left out. ${what}`
    : what;
}
