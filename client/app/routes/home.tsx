import { useId, useState } from 'react';
import { applyAdvice } from '../../features/brief/advice.ts';
import { AllSettings } from '../../features/brief/components/all-settings.tsx';
import { BriefSentence } from '../../features/brief/components/brief-sentence.tsx';
import {
  errorsFromProblem,
  litFraction,
  readDraft,
  targetHertz,
} from '../../features/brief/model.ts';
import type { BriefDraft } from '../../features/brief/model.ts';
import { useBrief } from '../../features/brief/use-brief.ts';
import { useSolvedPacks } from '../../features/packs/api/solve-packs.ts';
import { shopOptions } from '../../lib/shop.ts';
import { isProblem, isRefusal } from '../../lib/problem-error.ts';
import { usePageTitle } from '../../lib/use-page-title.ts';
import { useQuery } from '@tanstack/react-query';
import type { PulseStripData } from '../../../server/contracts/drawing.ts';
import { ChartRecorder } from '../../ui/chart-recorder.tsx';
import { Page } from '../../ui/page.tsx';
import { idealStrip } from '../../ui/strip-geometry.ts';
import { HomeRail } from '../home-rail.tsx';

const packsWanted = 24;

/** The solved strip while it is the answer to what is typed; until then the typed duty, drawn ideally. */
function stripFor(draft: BriefDraft, solved: PulseStripData | undefined): PulseStripData {
  const duty = litFraction(draft);
  if (solved !== undefined && Math.abs(solved.duty - duty) < 0.02) return solved;
  const hertz = targetHertz(draft);
  return idealStrip(duty, Number.isFinite(hertz) ? 1 / hertz : 1);
}

export function Component() {
  usePageTitle('Make a kit');
  const brief = useBrief();
  const shop = useQuery(shopOptions);
  const [open, setOpen] = useState(false);
  const settingsId = useId();
  const typed = readDraft(brief.draft, shop.data);
  const settled = readDraft(brief.settled, shop.data);
  // The default supply is the shop's own first battery, so the first question waits for the shop.
  const ready = shop.isPending ? undefined : settled.request;
  const solved = useSolvedPacks(ready === undefined ? undefined : { ...ready, limit: packsWanted });
  const refused =
    isProblem(solved.error) && isRefusal(solved.error) ? errorsFromProblem(solved.error) : {};
  const errors = { ...refused, ...typed.errors };
  return (
    <>
      <Page className="pt-9 pb-8 sm:pt-14">
        <h1 className="sr-only">Make a timing kit</h1>
        <BriefSentence draft={brief.draft} errors={errors} change={brief.change}>
          <button
            type="button"
            aria-expanded={open}
            aria-controls={settingsId}
            onClick={() => setOpen(!open)}
            className="link min-h-11 sm:min-h-8"
          >
            {open ? 'Fewer settings' : 'All settings'}
          </button>
        </BriefSentence>
        {open && (
          <AllSettings id={settingsId} draft={brief.draft} errors={errors} change={brief.change} />
        )}
      </Page>
      <ChartRecorder strip={stripFor(brief.draft, solved.data?.packs[0]?.strip)} />
      <Page className="pt-10">
        <HomeRail
          solved={solved}
          asking={ready !== undefined}
          refused={Object.keys(errors).length > 0}
          onAdvice={(change) => brief.change(applyAdvice(brief.draft, change))}
        />
      </Page>
    </>
  );
}
