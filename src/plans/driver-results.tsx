import type { VNode } from 'preact';
import type { Assessment, DriverResult } from '../assessment/assessment.js';
import { driverGroups } from '../assessment/driver-groups.js';
import { quantityText } from '../assessment/figure-text.js';
import { Table } from '../web/layout/parts.js';
import { resultTexts as words } from '../web/texts/en-results.js';
import { sentence } from '../assessment/sentence.js';
import { Folded } from './result-tables.js';

const strengths = [
  { from: 0.7, name: 'strong' },
  { from: 0.4, name: 'clear' },
  { from: 0, name: 'slight' },
] as const;

/** How strong, and which way, in words. */
function effectText({ quantity, rankCorrelation }: DriverResult): string {
  const { name } = strengths.find(({ from }) => Math.abs(rankCorrelation) >= from) ?? strengths[2];
  const of = quantity === 'oxygenFraction' ? words.drivers.oxygen : words.drivers.gas;
  const way = rankCorrelation > 0 ? words.drivers.more : words.drivers.less;
  return `${words.drivers[name]}: ${way} ${of} (${quantityText(rankCorrelation, 'ratio')})`;
}

/** What drives the answer: the uncertain inputs that move the band most, and how it was drawn. */
export function DriverResults({ assessment }: { readonly assessment: Assessment }): VNode {
  const { sampling } = assessment;
  const groups = driverGroups(assessment);
  return (
    <Folded title={words.drivers.title}>
      <p>
        {sampling === null
          ? words.drivers.notSampled
          : words.drivers.sampled
              .replace('{samples}', String(sampling.samples))
              .replace('{seed}', String(sampling.seed))}
      </p>
      {groups.length > 0 && (
        <Table
          caption={words.drivers.title}
          columns={words.drivers.columns}
          rows={groups.map(({ zoneTitle, quantityTitle, drivers }) => [
            zoneTitle,
            quantityTitle,
            <ul class="plain">
              {drivers.map((driver) => (
                <li key={driver.input}>
                  {sentence(driver.inputTitle)}. {effectText(driver)}
                </li>
              ))}
            </ul>,
          ])}
          rowHeads
        />
      )}
    </Folded>
  );
}
