/** The brief: five questions, read top to bottom, with the state of the fit above them when there is something to say. */
import Link from 'next/link';
import { slimFacts } from '@/app/_lib/slim-facts';
import { buildBrief } from '@/lib/brief/build-brief';
import type { BriefFacts } from '@/lib/brief/facts';
import type { MarketPage } from '@/lib/services/read-market';
import { canWrite as canWriteMarkets, type Viewer } from '@/lib/services/viewer';
import { BacktestStanding } from '../backtest/backtest-standing';
import { ChangeSection } from '../change/change-section';
import type { KeptScenario } from '../change/kept-scenarios';
import { ScenarioProvider } from '../change/scenario-state';
import { FitStanding } from '../fit/fit-standing';
import { PageFrame } from '../frame/page-frame';
import { IdentifiabilityStanding } from '../identifiability/identifiability-standing';
import { IssueSection } from '../issue/issue-section';
import { ArchivedNote } from '../markets/archived-note';
import { PriorForm } from '../priors/prior-form';
import { TrustSection } from './trust-section';
import { WhereSection } from './where-section';
import { WhySection } from './why-section';

interface MarketBriefProps {
  viewer: Viewer;
  page: MarketPage;
  facts: BriefFacts;
}

export function MarketBrief({ viewer, page, facts }: MarketBriefProps) {
  const brief = buildBrief(facts, { hasScenario: true });
  const canWrite = canWriteMarkets(viewer);
  return (
    <PageFrame
      title={brief.market.name}
      facts={<DataFacts page={page} dataLine={brief.dataLine} />}
      viewer={viewer}
    >
      <ArchivedNote market={page.market} canWrite={canWrite} />
      <FitStanding page={page} canWrite={canWrite} />
      <WhereSection where={brief.where} />
      <WhySection why={brief.why} />
      <ScenarioProvider facts={slimFacts(facts)}>
        {page.outlook ? (
          <ChangeSection
            change={brief.change}
            marketId={page.market.id}
            fitId={page.outlook.fitId}
            scenarios={keepScenarios(page)}
            phaseMap={brief.why.phaseMap}
            canWrite={canWrite}
          />
        ) : null}
        <TrustSection
          trust={brief.trust}
          cautions={brief.cautions}
          decisionStanding={<IdentifiabilityStanding page={page} canWrite={canWrite} />}
          priorForm={
            canWrite ? (
              <PriorForm marketId={page.market.id} stored={page.market.priors} names={facts.market} />
            ) : null
          }
        >
          <BacktestStanding page={page} canWrite={canWrite} />
        </TrustSection>
        <IssueSection page={page} scenarios={keepScenarios(page)} canWrite={canWrite} />
      </ScenarioProvider>
    </PageFrame>
  );
}

function keepScenarios({ scenarios }: MarketPage): KeptScenario[] {
  return scenarios.map(({ id, name, pushes, money, fitId }) => ({ id, name, pushes, money, fitId }));
}

function DataFacts({ page, dataLine }: { page: MarketPage; dataLine: string }) {
  const issued =
    page.issued.length === 0
      ? 'issued by nobody yet'
      : `issued ${page.issued.length} ${page.issued.length === 1 ? 'time' : 'times'}`;
  return (
    <>
      <Link href={`/markets/${page.market.id}/data`}>{dataLine}</Link>&nbsp;· {issued}
    </>
  );
}
