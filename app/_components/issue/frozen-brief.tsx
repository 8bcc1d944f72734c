/**
 * An issued forecast as it was frozen: the brief written from its own numbers, its date, who issued it, its data months and
 * its cautions. It reads nothing but the record, so it stays as it was whatever happens to the market.
 */
import { formatDay, LOCALE } from '@/app/_lib/locale';
import type { IssuedForecast } from '@/lib/issue/format';
import { openIssued } from '@/lib/issue/open';
import { TrustSection } from '../brief/trust-section';
import { WhereSection } from '../brief/where-section';
import { WhySection } from '../brief/why-section';
import { PushAnswer } from '../change/push-answer';
import { PushFigures } from '../change/push-figures';
import { PageFrame, type PageViewer } from '../frame/page-frame';
import { Question } from '../frame/question';
import { SensitivityFigure } from '../identifiability/sensitivity-figure';

interface FrozenBriefProps {
  forecast: IssuedForecast;
  viewer: PageViewer | null;
}

export function FrozenBrief({ forecast, viewer }: FrozenBriefProps) {
  const { brief, scenario, stamp } = openIssued(forecast, { locale: LOCALE });
  const { sensitivity } = brief.change;
  return (
    <PageFrame
      title={brief.market.name}
      facts={<IssuedFacts forecast={forecast} dataLine={brief.dataLine} />}
      viewer={viewer}
    >
      <WhereSection where={brief.where} />
      <WhySection why={brief.why} />
      {scenario || sensitivity ? (
        <Question
          id="change"
          question={brief.change.question}
          note={scenario ? <ScenarioNote name={scenario.name} pushes={scenario.pushes} /> : undefined}
        >
          {scenario ? (
            <>
              <PushAnswer push={scenario.push} />
              <PushFigures push={scenario.push} />
            </>
          ) : null}
          {sensitivity ? <SensitivityFigure figure={sensitivity} /> : null}
        </Question>
      ) : null}
      <TrustSection trust={brief.trust} cautions={[{ id: 'stamp', text: stamp }, ...brief.cautions]} />
    </PageFrame>
  );
}

function IssuedFacts({ forecast, dataLine }: { forecast: IssuedForecast; dataLine: string }) {
  return (
    <>
      issued <time dateTime={forecast.issuedAt}>{formatDay(new Date(forecast.issuedAt))}</time> by{' '}
      {forecast.issuedBy} · {dataLine}
    </>
  );
}

function ScenarioNote({ name, pushes }: { name: string; pushes: string[] }) {
  return (
    <>
      <p>Scenario: {name}</p>
      {pushes.map((push) => (
        <p key={push}>{push}.</p>
      ))}
    </>
  );
}
