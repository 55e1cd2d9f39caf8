import { Fragment, type VNode } from 'preact';
import type { Figure, SmallestAudible, SoundNote, SoundResult } from '../assessment/assessment.js';
import { hasPreview } from '../assessment/sound-preview.js';
import { quantityText } from '../assessment/figure-text.js';
import { OpenableFigure } from '../web/layout/parts.js';
import { soundTexts as words } from '../web/texts/en-sound.js';

const noteText = ({ name, centsOff }: SoundNote): string =>
  `${name} ${quantityText(centsOff, 'cents')}`;

function Fact(props: {
  readonly name: string;
  readonly figure: Figure | null;
  readonly note?: SoundNote | null;
}): VNode | null {
  const { name, figure, note = null } = props;
  if (figure === null) return null;
  return (
    <>
      <dt>{name}</dt>
      <dd>
        <OpenableFigure figure={figure} />
        {note !== null && <span class="note-name"> {noteText(note)}</span>}
      </dd>
    </>
  );
}

function Amount(props: { readonly name: string; readonly figure: Figure | null }): VNode | null {
  if (props.figure === null) return null;
  return (
    <>
      {' '}
      {props.name} <OpenableFigure figure={props.figure} rounding="up" />
    </>
  );
}

function Smallest({ rows }: { readonly rows: readonly SmallestAudible[] }): VNode | null {
  if (rows.length === 0) return null;
  const shift = ({ cents, formantChange }: SmallestAudible): string =>
    cents === null
      ? `${String(Math.round((formantChange ?? 0) * 100))}\u00a0% ${words.ofTimbre}`
      : quantityText(cents, 'cents').replace('+', '');
  return (
    <>
      <h4>{words.smallest}</h4>
      <ul>
        {rows.map((row) => (
          <li key={row.words}>
            {row.words} {shift(row)}: <OpenableFigure figure={row.gasFraction} />
            <Amount name={words.bySqueezing} figure={row.amount} />
            <Amount name={words.byFlushing} figure={row.amountByFlushing} />
          </li>
        ))}
      </ul>
    </>
  );
}

function Voice({ result }: { readonly result: SoundResult }): VNode | null {
  const { voice } = result;
  if (voice === null) return null;
  return (
    <>
      <Fact name={words.factor} figure={voice.factor} />
      {voice.formants.map((figure, index) => (
        <Fact
          key={index}
          name={`${words.formant} ${String(index + 1)} (${words.inAir.toLowerCase()} ${quantityText(voice.formantsInAir[index]?.value ?? 0, 'Hz')})`}
          figure={figure}
        />
      ))}
    </>
  );
}

/** The two sounds, made by arithmetic: fetched only when somebody presses play. */
function Listen(props: { readonly planId: string; readonly index: number }): VNode {
  const { planId, index } = props;
  const base = `/plans/${planId}/sound/${String(index)}`;
  return (
    <figure class="listen">
      <figcaption>{words.illustration}</figcaption>
      {(['before', 'after'] as const).map((which) => (
        <p key={which}>
          <span id={`listen-${String(index)}-${which}`}>{words[which]}</span>{' '}
          <audio
            controls
            preload="none"
            src={`${base}/${which}.wav`}
            aria-labelledby={`listen-${String(index)}-${which}`}
          />
        </p>
      ))}
    </figure>
  );
}

function Card(props: {
  readonly planId: string;
  readonly index: number;
  readonly result: SoundResult;
}): VNode {
  const { planId, index, result } = props;
  return (
    <article class="sound-card">
      <h3>{result.title}</h3>
      <p>{result.words}</p>
      <dl class="facts">
        <Fact name={words.inAir} figure={result.frequencyInAir} note={result.noteInAir} />
        <Fact name={words.inGas} figure={result.frequency} note={result.note} />
        <Fact name={words.shift} figure={result.cents} />
        <Voice result={result} />
        <Fact name={words.amount} figure={result.amount} />
        <Fact name={words.amountByFlushing} figure={result.amountByFlushing} />
        {result.jet.map((answer) => (
          <Fragment key={answer.supply}>
            <dt>{answer.supply === 'pressure' ? words.jetPressure : words.jetFlow}</dt>
            <dd>
              {answer.words} <OpenableFigure figure={answer.intonation} label={words.intonation} />
            </dd>
          </Fragment>
        ))}
        {result.saferWay !== '' && (
          <>
            <dt>{result.refusal === null ? words.saferWay : words.instead}</dt>
            <dd>{result.saferWay}</dd>
          </>
        )}
      </dl>
      <Smallest rows={result.smallestAudible} />
      {result.remarks.length > 0 && (
        <ul class="remarks">
          {result.remarks.map((remark) => (
            <li key={remark}>{remark}</li>
          ))}
        </ul>
      )}
      {hasPreview(result) && <Listen planId={planId} index={index} />}
    </article>
  );
}

/** What the audience hears, beside the amount that buys it. */
export function SoundCards(props: {
  readonly planId: string;
  readonly sound: readonly SoundResult[];
}): VNode | null {
  const { planId, sound } = props;
  if (sound.length === 0) return null;
  return (
    <section aria-labelledby="sound-title">
      <h2 id="sound-title">{words.title}</h2>
      {sound.map((result, index) => (
        <Card
          key={`${result.act} ${String(index)}`}
          planId={planId}
          index={index}
          result={result}
        />
      ))}
    </section>
  );
}
