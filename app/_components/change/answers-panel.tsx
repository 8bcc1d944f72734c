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
import { addPush } from './scenario-draft';
import { useScenario } from './scenario-state';
import { ToldSentences } from './told-sentences';
import { useAnswerRun } from './use-answer-run';

export function AnswersPanel({ prepared }: { prepared: PreparedScenario }) {
  const { facts, pushes, scale, words, change, draft } = useScenario();
  const [question, setQuestion] = useState<CounterQuestion>(() => firstQuestion(facts, scale, pushes));
  const [answer, ask, stop] = useAnswerRun<CounterAnswers>();
  const isRunning = answer.state === 'running';
  return (
    <section className={styles.panel} aria-label="The smallest answer">
      <h3 className={styles.figureName}>What is the smallest answer?</h3>
      <CounterForm question={question} onChange={setQuestion} />
      <p className={styles.actions}>
        <Button
          isBusy={isRunning}
          busyLabel="Looking"
          onClick={() => ask(askCounterPush(prepared, { ...question, pushes }, scale))}
        >
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
      <div aria-live="polite">
        {answer.state === 'done' ? (
          <>
            <ToldSentences
              sentences={writeSmallestPush(words, answer.answer.smallest, draft.money?.currency)}
            />
            {answer.answer.lastMonth ? (
              <ToldSentences sentences={writeLastUsefulMonth(words, answer.answer.lastMonth)} />
            ) : null}
            {'push' in answer.answer.smallest ? (
              <TakeButton
                onTake={() => {
                  const { smallest } = answer.answer;
                  if ('push' in smallest) change((known) => addPush(known, smallest.push));
                }}
              />
            ) : null}
          </>
        ) : null}
      </div>
      {answer.state === 'done' ? (
        <ChanceMapFigure map={answer.answer.chanceMap} goal={spellTarget(words, question.target)} />
      ) : null}
    </section>
  );
}

function TakeButton({ onTake }: { onTake: () => void }) {
  return (
    <p className={styles.actions}>
      <Button onClick={onTake}>Put it into the scenario</Button>
    </p>
  );
}
