'use client';

/** What is the smallest answer? A share to keep, the kind of counter-push; its smallest size, last useful month, map of chances. */
import { useState } from 'react';
import { spellTarget, writeLastUsefulMonth, writeSmallestPush } from '@/lib/brief/answer-words';
import type { PreparedScenario } from '@/lib/scenario/prepare-scenario';
import { Button } from '../controls/button';
import { askCounterPush, type CounterAnswers } from './ask-counter-push';
import { ChanceMapFigure } from './chance-map-figure';
import styles from './change.module.css';
import { CounterForm, type CounterQuestion, firstQuestion } from './counter-form';
import { OldAnswer } from './old-answer';
import { addPush } from './scenario-draft';
import { useScenario } from './scenario-state';
import { ToldSentences } from './told-sentences';
import { useAnswerRun } from './use-answer-run';

export function AnswersPanel({ prepared }: { prepared: PreparedScenario }) {
  const { facts, pushes, scale, words, setAsked } = useScenario();
  const [question, setQuestion] = useState<CounterQuestion>(() => firstQuestion(facts, scale, pushes));
  const { answer, isOld, ask, stop } = useAnswerRun<CounterAnswers>([question, ...pushes]);
  const isRunning = answer.state === 'running';
  const look = () => {
    setAsked(question);
    ask(askCounterPush(prepared, { ...question, pushes }, scale));
  };
  return (
    <section className={`${styles.panel} ${styles.wide}`} aria-label="The smallest answer">
      <h3 className={styles.figureName}>What is the smallest answer?</h3>
      <div className={styles.layout}>
        <div className={styles.panel}>
          <CounterForm question={question} words={words} scale={scale} onChange={setQuestion} />
          <p className={styles.actions}>
            <Button isBusy={isRunning} busyLabel="Looking" onClick={look}>
              Look for it
            </Button>
            {isRunning ? (
              <Button kind="text" onClick={stop}>
                Stop
              </Button>
            ) : null}
          </p>
          {isRunning ? (
            <progress
              className={styles.progress}
              max={1}
              value={answer.progress}
              aria-label="Part of the draws followed"
            />
          ) : null}
        </div>
        <div className={styles.panel}>
          <div aria-live="polite" className={styles.answered}>
            {answer.state === 'done' && isOld ? <OldAnswer /> : null}
            {answer.state === 'done' ? <Told answers={answer.answer} /> : null}
          </div>
          {answer.state === 'done' ? (
            <ChanceMapFigure
              map={answer.answer.chanceMap}
              goal={spellTarget(words, answer.answer.chanceMap.target)}
            />
          ) : (
            <p className={styles.waiting}>
              Say what is to be kept; then the draws are searched for the smallest push that keeps it, for the
              last month in which it may start, and for the chance at other sizes and starts.
            </p>
          )}
        </div>
      </div>
    </section>
  );
}

function Told({ answers: { smallest, lastMonth } }: { answers: CounterAnswers }) {
  const { words, draft, change } = useScenario();
  return (
    <>
      <ToldSentences sentences={writeSmallestPush(words, smallest, draft.money?.currency)} />
      {lastMonth ? <ToldSentences sentences={writeLastUsefulMonth(words, lastMonth)} /> : null}
      {'push' in smallest ? (
        <TakeButton onTake={() => change((known) => addPush(known, smallest.push))} />
      ) : null}
    </>
  );
}

function TakeButton({ onTake }: { onTake: () => void }) {
  return (
    <p className={styles.actions}>
      <Button onClick={onTake}>Put it into the scenario</Button>
    </p>
  );
}
