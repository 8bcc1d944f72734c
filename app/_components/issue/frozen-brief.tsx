/**
 * An issued forecast as it was frozen: the brief written from its own numbers, its date, who issued it, its data months and
 * its cautions. It reads nothing but the record, so it stays as it was whatever happens to the market.
 */
import { formatDay, LOCALE } from '@/app/_lib/locale';
import { slimFacts } from '@/app/_lib/slim-facts';
import type { IssuedForecast } from '@/lib/issue/format';
import { factsOfIssued, listScenarios, type OpenedScenario, openIssued } from '@/lib/issue/open';
import { TrustSection } from '../brief/trust-section';
import { WhereSection } from '../brief/where-section';
import { WhySection } from '../brief/why-section';
import { PushAnswer } from '../change/push-answer';
import { PushFigures } from '../change/push-figures';
import { ReaderTrial } from '../change/reader-trial';
import { SideBySideView } from '../change/side-by-side-figure';
import { ToldSentences } from '../change/told-sentences';
import { PageFrame, type PageViewer } from '../frame/page-frame';
import { Question } from '../frame/question';
import { SensitivityFigure } from '../identifiability/sensitivity-figure';
import styles from './issue.module.css';

interface FrozenBriefProps {
  forecast: IssuedForecast;
  viewer: PageViewer | null;
}

export function FrozenBrief({ forecast, viewer }: FrozenBriefProps) {
  const { brief, scenarios, sideBySide, trial, stamp } = openIssued(forecast, { locale: LOCALE });
  const { sensitivity } = brief.change;
  return (
    <PageFrame
      title={brief.market.name}
      facts={<IssuedFacts forecast={forecast} dataLine={brief.dataLine} />}
      viewer={viewer}
    >
      <WhereSection where={brief.where} />
      <WhySection why={brief.why} />
      {scenarios.length > 0 || sensitivity ? (
        <Question id="change" question={brief.change.question}>
          {scenarios.map((scenario) => (
            <FrozenScenario key={scenario.name} scenario={scenario} />
          ))}
          {sideBySide ? <SideBySideView view={sideBySide} names={forecast.market} /> : null}
          {trial && scenarios.length > 0 ? (
            <ReaderTrial
              facts={slimFacts(factsOfIssued(forecast))}
              trial={trial}
              pushes={listScenarios(forecast)[0]?.pushes ?? []}
              phaseMap={brief.why.phaseMap}
            />
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

function FrozenScenario({ scenario }: { scenario: OpenedScenario }) {
  const { name, pushes, push, money, answers } = scenario;
  return (
    <section className={styles.scenario} aria-label={`Scenario: ${name}`}>
      <h3 className={styles.scenarioName}>{name}</h3>
      <ul className={styles.pushes}>
        {pushes.map((one) => (
          <li key={one}>{one}.</li>
        ))}
      </ul>
      <PushAnswer push={push} />
      <ToldSentences sentences={[...answers.smallestPush, ...answers.lastUsefulMonth, ...money]} />
      <PushFigures push={push} />
    </section>
  );
}
