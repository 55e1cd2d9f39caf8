import type { VNode } from 'preact';
import type { Assessment, Figure, SectionMoment } from '../assessment/assessment.js';
import { figureText } from '../assessment/figure-text.js';
import { Table } from '../web/layout/parts.js';
import { chosenMoment, momentKey, momentTitle, momentView } from '../web/section/moment-view.js';
import { phoneRoom } from '../web/section/placement.js';
import { SectionDrawing } from '../web/section/section-drawing.js';
import { spacesInUse } from '../web/section/spaces-in-use.js';
import { sectionWords } from '../web/section/section-words.js';
import { resultTexts as words } from '../web/texts/en-results.js';
import { sentence } from '../assessment/sentence.js';

const told = (figure: Figure | null): string => (figure === null ? '\u2013' : figureText(figure));

/** The section and its numbers at one moment: what a step of the slider replaces. */
export function MomentPart(props: {
  readonly assessment: Assessment;
  readonly moment: SectionMoment | null;
}): VNode {
  const { assessment, moment } = props;
  const { section } = assessment;
  if (moment === null) {
    return (
      <figure class="drawn">
        <SectionDrawing view={section} />
        <figcaption>{sentence(section.moment)}</figcaption>
      </figure>
    );
  }
  const { view: used, leftOut } = spacesInUse(section, assessment.acts, section.moments);
  const view = momentView(used, moment, sectionWords);
  const title = `${words.cases[moment.caseName]}, ${momentTitle(moment)}`;
  return (
    <>
      <figure class="drawn fitting">
        <div class="wide-only">
          <SectionDrawing view={view} />
        </div>
        <div class="narrow-only">
          <SectionDrawing view={view} options={{ room: phoneRoom }} />
        </div>
        <figcaption>
          {sentence(title)}. {words.sectionCaption}
          {leftOut.length > 0 && ` ${words.notDrawn} ${leftOut.join(', ')}.`}
        </figcaption>
      </figure>
      <Table
        caption={sentence(title)}
        columns={words.momentColumns}
        rows={moment.zones.map(({ id, oxygen, oxygenBound, gas, gasTitle }) => [
          section.zones.find((zone) => zone.id === id)?.title ?? id,
          told(oxygen),
          told(oxygenBound),
          gas === null || gasTitle === null ? '\u2013' : `${gasTitle} ${told(gas)}`,
        ])}
        rowHeads
      />
    </>
  );
}

const cases = ['planned', 'worstCredible'] as const;

/** The section with the choice of its moment; a form that the script turns into a slider. */
export function SectionResults(props: {
  readonly planId: string;
  readonly assessment: Assessment;
  readonly at: string | undefined;
}): VNode | null {
  const { planId, assessment, at } = props;
  const { section, inputHash } = assessment;
  if (section.spaces.length === 0) return null;
  const moment = chosenMoment(section, at);
  const chosen = moment && momentKey(moment);
  return (
    <section id="section" aria-labelledby="section-title">
      <h2 id="section-title">{words.section}</h2>
      {moment && (
        <form
          method="get"
          action={`/plans/${planId}#section`}
          class="moments"
          data-source={`/plans/${planId}/moment?v=${inputHash.slice(0, 12)}&at=`}
          data-earlier={words.earlier}
          data-later={words.later}
          data-slider={words.moment}
        >
          <label for="moment">{words.moment}</label>
          <select id="moment" name="at">
            {cases.map((caseName) => {
              const own = section.moments.filter((one) => one.caseName === caseName);
              if (own.length === 0) return null;
              return (
                <optgroup key={caseName} label={words.momentCases[caseName]}>
                  {own.map((one) => (
                    <option
                      key={momentKey(one)}
                      value={momentKey(one)}
                      selected={momentKey(one) === chosen}
                      data-at={String(one.atS)}
                      data-case={caseName}
                    >
                      {momentTitle(one)}
                    </option>
                  ))}
                </optgroup>
              );
            })}
          </select>
          <button type="submit" class="second">
            {words.showMoment}
          </button>
        </form>
      )}
      <div id="moment-view">
        <MomentPart assessment={assessment} moment={moment} />
      </div>
    </section>
  );
}
