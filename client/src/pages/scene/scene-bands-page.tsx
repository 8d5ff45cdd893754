import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { LeaveGuard } from '../../components/ui/leave-guard.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import { BandFigures } from '../../features/scenes/band-figures.tsx';
import { BandHistograms } from '../../features/scenes/band-histograms.tsx';
import { BandReading } from '../../features/scenes/band-reading.tsx';
import { SceneForm } from '../../features/scenes/scene-form.tsx';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { SceneGate } from './scene-gate.tsx';

const FORM_ID = 'scene-bands';

/** The band table of one scene, with its statistics and histograms. */
export function SceneBandsPage() {
  const { sceneId = '' } = useParams();
  return <SceneGate sceneId={sceneId}>{(scene) => <Bands key={scene.id} scene={scene} />}</SceneGate>;
}

function Bands({ scene }: { scene: Scene }) {
  const { id, abilities } = useProject();
  const canManage = abilities.manageScenes;
  const [{ isDirty, isSaving }, setStanding] = useState({ isDirty: false, isSaving: false });
  const [unit, setUnit] = useState<'scaled' | 'stored'>('scaled');
  const isScaled = unit === 'scaled';
  return (
    <ReadingPage
      header={
        <PageHeader
          title="Band table"
          crumb={scene.name}
          action={
            <>
              <Link to={paths.scene(id, scene.id)} className={buttonClass()}>
                To the map
              </Link>
              {canManage && (
                <Button
                  kind="primary"
                  type="submit"
                  form={FORM_ID}
                  // Guessed roles may be right as they are: saving them says so.
                  disabled={!isDirty && !scene.guessedRoles}
                  isPending={isSaving}
                  pendingLabel="Saving…"
                >
                  {isDirty || !scene.guessedRoles ? 'Save changes' : 'Confirm these roles'}
                </Button>
              )}
            </>
          }
        />
      }
    >
      <div className="space-y-9">
        {canManage ? (
          <SceneForm formId={FORM_ID} scene={scene} onStanding={setStanding} />
        ) : (
          <BandReading scene={scene} />
        )}
        <Section
          title="Statistics"
          note="Over every valid pixel of a band, counted once when the scene was ingested."
          action={
            <Segmented
              label="Values as"
              value={unit}
              onChange={setUnit}
              options={[
                { value: 'scaled', label: 'Scaled' },
                { value: 'stored', label: 'Stored (DN)' },
              ]}
            />
          }
        >
          <BandFigures scene={scene} isScaled={isScaled} />
          {isDirty && (
            <p className="mt-2 text-xs text-ink-soft">Scaled by the band table as saved, not as typed above.</p>
          )}
        </Section>
        <Section title="Histograms" note="How many pixels hold which value.">
          <BandHistograms scene={scene} isScaled={isScaled} />
        </Section>
      </div>
      <LeaveGuard isOn={isDirty} loses="Your changes to this scene’s name, date or band table" />
    </ReadingPage>
  );
}
