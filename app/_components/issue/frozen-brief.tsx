/**
 * An issued forecast as it was frozen: the brief written from its own numbers, its date, who issued it, its data months and
 * its cautions. It reads nothing but the record, so it stays as it was whatever happens to the market.
 */
import { formatDay } from '@/app/_lib/locale';
import { buildBrief } from '@/lib/brief/build-brief';
import { buildPushBrief } from '@/lib/brief/push-brief';
import type { IssuedForecast } from '@/lib/issue/format';
import { factsOfIssued } from '@/lib/issue/open';
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
  const { market, scenario } = forecast;
  const facts = factsOfIssued(forecast);
  const brief = buildBrief(facts, { hasScenario: scenario !== null });
  const push = scenario && buildPushBrief(scenario.comparison, facts);
  const { sensitivity } = brief.change;
  const issued = `issued ${formatDay(new Date(forecast.issuedAt))} by ${forecast.issuedBy}`;
  return (
    <PageFrame title={market.name} facts={`${issued} · ${brief.dataLine}`} viewer={viewer}>
      <WhereSection where={brief.where} />
      <WhySection why={brief.why} />
      {(scenario && push) || sensitivity ? (
        <Question
          id="change"
          question={brief.change.question}
          note={scenario ? <p>{scenario.name}.</p> : undefined}
        >
          {push ? (
            <>
              <PushAnswer push={push} />
              <PushFigures push={push} />
            </>
          ) : null}
          {sensitivity ? <SensitivityFigure figure={sensitivity} /> : null}
        </Question>
      ) : null}
      <TrustSection trust={brief.trust} cautions={brief.cautions} />
    </PageFrame>
  );
}
