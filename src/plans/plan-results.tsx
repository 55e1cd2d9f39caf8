import { Fragment, type VNode } from 'preact';
import type { Assessment, DecidingQuestion, Finding } from '../assessment/assessment.js';
import { conditionGroups, placeLine } from '../assessment/condition-groups.js';
import { findingGroups } from '../assessment/finding-groups.js';
import type { ErrorDetail } from '../errors.js';
import { quantityText } from '../assessment/figure-text.js';
import { fieldId } from '../web/forms/fields.js';
import { DecisionBox, OpenableFigure } from '../web/layout/parts.js';
import { chosenMoment } from '../web/section/moment-view.js';
import { en } from '../web/texts/en.js';
import { planTexts } from '../web/texts/en-plans.js';
import { resultTexts as words } from '../web/texts/en-results.js';
import { AmountsAndHolds, ControlResults, WordsByPart, Workings } from './result-tables.js';
import { DriverResults } from './driver-results.js';
import { SectionResults } from './section-results.js';
import { SoundCards } from './sound-card.js';
import { sentence } from '../assessment/sentence.js';
import { ZoneResults } from './zone-results.js';

/** Where the entry behind a place of the plan file stands: on this page or on that of the venue. */
export type PlaceLink = (pointer: string) => string | undefined;

function Decision({ assessment }: { readonly assessment: Assessment }): VNode {
  const { decision, governing } = assessment;
  const same = decision.asFiled === decision.withControls;
  return (
    <>
      <DecisionBox
        word={decision.asFiled}
        label={same ? words.decision : words.asFiled}
        reason={governing === null ? undefined : sentence(governing.reason)}
      />
      {!same && <DecisionBox word={decision.withControls} label={words.withControls} />}
      {governing && (
        <dl class="facts governing">
          <dt>{words.governing}</dt>
          <dd>
            {governing.zoneTitle}, {words.cases[governing.caseName]},{' '}
            {words.answers[governing.answer].toLowerCase()}{' '}
            <OpenableFigure figure={governing.figure} />
            {words.governingLevel} <OpenableFigure figure={governing.limit} />
          </dd>
          <dt>{words.row}</dt>
          <dd>{governing.row}</dd>
        </dl>
      )}
    </>
  );
}

function Linked(props: { readonly href: string | undefined; readonly text: string }): VNode {
  return props.href === undefined ? <>{props.text}</> : <a href={props.href}>{props.text}</a>;
}

function Questions(props: {
  readonly questions: readonly DecidingQuestion[];
  readonly linkTo: PlaceLink;
}): VNode | null {
  if (props.questions.length === 0) return null;
  return (
    <section aria-labelledby="questions-title">
      <h2 id="questions-title">{words.questions}</h2>
      <ul>
        {props.questions.map(({ path, question, wordAtBest, wordAtWorst, suffices }) => (
          <li key={path}>
            <Linked href={props.linkTo(path)} text={question} /> ({words.questionAtBest}{' '}
            {en.decisions[wordAtBest]}, {words.questionAtWorst} {en.decisions[wordAtWorst]})
            {suffices && (
              <>
                {' '}
                {words.suffices} {quantityText(suffices.value, suffices.unit)}
              </>
            )}
          </li>
        ))}
      </ul>
    </section>
  );
}

/** The conditions by when they must be met; those alike stand together, place by place. */
function Conditions({ assessment }: { readonly assessment: Assessment }): VNode {
  const groups = conditionGroups(assessment);
  const parts = [true, false].flatMap((blocks) => {
    const items = groups.filter(({ blocksStart }) => blocksStart === blocks);
    return items.length === 0 ? [] : [{ blocks, items }];
  });
  return (
    <>
      {parts.map(({ blocks, items }, part) => (
        <Fragment key={String(blocks)}>
          <h3>{blocks ? words.blocks : words.onTheDay}</h3>
          <ol class="conditions" start={part === 0 ? 1 : (parts[0]?.items.length ?? 0) + 1}>
            {items.map((group) => (
              <li key={group.numbers.join()}>
                <strong>{group.head}</strong>
                {group.remark !== '' && ` ${group.remark}`}
                {group.acts.length > 0 && (
                  <span class="hint">
                    {' '}
                    {words.conditionActs} {group.acts.join('; ')}.
                  </span>
                )}
                {group.places.length > 0 && (
                  <ul>
                    {group.places.map((place) => (
                      <li key={place.place}>{sentence(placeLine(place))}</li>
                    ))}
                  </ul>
                )}
              </li>
            ))}
          </ol>
        </Fragment>
      ))}
    </>
  );
}

function FindingItem(props: { readonly text: string; readonly href: string | undefined }): VNode {
  const { text, href } = props;
  return (
    <>
      {text}
      {href !== undefined && (
        <>
          {' '}
          <a href={href}>
            {words.toEntry}
            <span class="unseen">: {text}</span>
          </a>
        </>
      )}
    </>
  );
}

function Findings(props: {
  readonly findings: readonly Finding[];
  readonly linkTo: PlaceLink;
}): VNode | null {
  const { findings, linkTo } = props;
  if (findings.length === 0) return null;
  const to = (path: string) => (path === '' ? undefined : linkTo(path));
  return (
    <section aria-labelledby="findings-title">
      <h2 id="findings-title">{words.findings}</h2>
      <ul class="findings">
        {findingGroups({ findings }).map(({ code, kind, items, shared }) => {
          const [first] = items;
          return (
            <li key={`${kind} ${code}`} class={`finding ${kind}`}>
              <strong>{words.findingKinds[kind]}:</strong>{' '}
              {items.length === 1 && first !== undefined ? (
                <FindingItem text={first.text} href={to(first.path)} />
              ) : (
                <>
                  {shared}
                  <ul>
                    {items.map(({ text, path }) => (
                      <li key={text}>
                        <FindingItem text={text} href={to(path)} />
                      </li>
                    ))}
                  </ul>
                </>
              )}
            </li>
          );
        })}
      </ul>
    </section>
  );
}

/** Everything that was worked out, the word first, the workings last. */
export function PlanResults(props: {
  readonly planId: string;
  readonly assessment: Assessment;
  readonly linkTo: PlaceLink;
  /** Name of the moment that the section shows. */
  readonly at?: string | undefined;
}): VNode {
  const { planId, assessment, linkTo } = props;
  const { conditions, refusals } = assessment;
  return (
    <>
      <Decision assessment={assessment} />
      {refusals.length > 0 && (
        <section aria-labelledby="refusals-title">
          <h2 id="refusals-title">{words.refusals}</h2>
          <ul class="refusals">
            {refusals.map(({ act, reason, alternative }) => (
              <li key={`${act} ${reason}`}>
                <strong>{assessment.acts.find(({ id }) => id === act)?.title ?? act}.</strong>{' '}
                {reason} {words.instead} {alternative}
              </li>
            ))}
          </ul>
        </section>
      )}
      {conditions.length > 0 && (
        <section aria-labelledby="conditions-title">
          <h2 id="conditions-title">{words.conditions}</h2>
          <Conditions assessment={assessment} />
        </section>
      )}
      <Questions questions={assessment.questionsThatDecide} linkTo={linkTo} />
      <Findings findings={assessment.findings} linkTo={linkTo} />
      <SectionResults planId={planId} assessment={assessment} at={props.at} />
      <ZoneResults
        planId={planId}
        assessment={assessment}
        moment={chosenMoment(assessment.section, props.at)}
      />
      <SoundCards planId={planId} sound={assessment.sound} />
      <WordsByPart assessment={assessment} />
      <AmountsAndHolds assessment={assessment} />
      <ControlResults assessment={assessment} />
      <DriverResults assessment={assessment} />
      <Workings assessment={assessment} />
    </>
  );
}

/**
 * In place of the results while they are being worked out. A script fetches them; without it a link
 * asks again, so that nothing typed meanwhile is lost to a reload.
 */
export function Waiting({ planId }: { readonly planId: string }): VNode {
  return (
    <section
      class="waiting"
      aria-labelledby="waiting-title"
      data-source={`/plans/${planId}/results`}
      data-meanwhile={words.waiting.meanwhile}
      data-done={words.waiting.done}
      data-lost={words.waiting.lost}
    >
      <h2 id="waiting-title">{words.waiting.title}</h2>
      <p>{words.waiting.words}</p>
      <p class="hint" />
      <p>
        <a class="button second" href={`/plans/${planId}?wait#results`}>
          {words.waiting.show}
        </a>
      </p>
    </section>
  );
}

/** Why there is no result: each reason leads to its entry. */
export function NoResults(props: {
  readonly message: string;
  readonly hint: string;
  readonly problems: readonly ErrorDetail[];
}): VNode {
  const { message, hint, problems } = props;
  return (
    <section class="no-results" aria-labelledby="no-results-title">
      <h2 id="no-results-title">{words.failed}</h2>
      {problems.length === 0 ? (
        <p>
          {message} {hint}
        </p>
      ) : (
        <>
          <p>{words.failedIntro}</p>
          <ul>
            {problems.map(({ path, problem }) => (
              <li key={`${path} ${problem}`}>
                <Linked
                  href={path.length > 1 ? `#${fieldId(path.slice(1))}` : undefined}
                  text={problem}
                />
              </li>
            ))}
          </ul>
        </>
      )}
      <p class="hint">{planTexts.asSaved}</p>
    </section>
  );
}
