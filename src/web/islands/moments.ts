/**
 * Moves one moment through the results of a plan: a line on every curve, and the section with its
 * table. The page does the same without this file, by the form that it takes over here.
 */

/** Where a time stands on a curve: the axis in seconds, the plot in units of the drawing. */
export interface PlotFrame {
  readonly fromS: number;
  readonly toS: number;
  readonly left: number;
  readonly right: number;
}

/** Place of a time on a curve, or null where the curve does not reach it. */
export function markPlace(atS: number, { fromS, toS, left, right }: PlotFrame): number | null {
  if (toS <= fromS || atS < fromS || atS > toS) return null;
  return left + ((atS - fromS) / (toS - fromS)) * (right - left);
}

const number = (element: Element, name: string): number => Number(element.getAttribute(name));

function moveMarks(atS: number, caseName: string): void {
  for (const mark of document.querySelectorAll('svg.moment-mark')) {
    const place = markPlace(atS, {
      fromS: number(mark, 'data-from'),
      toS: number(mark, 'data-to'),
      left: number(mark, 'data-left'),
      right: number(mark, 'data-right'),
    });
    const isShown = place !== null && mark.getAttribute('data-case') === caseName;
    mark.toggleAttribute('hidden', !isShown);
    const line = mark.querySelector('line');
    line?.setAttribute('x1', String(place ?? 0));
    line?.setAttribute('x2', String(place ?? 0));
  }
}

interface Words {
  readonly earlier: string;
  readonly later: string;
  readonly slider: string;
}

function button(text: string, step: () => void): HTMLButtonElement {
  const made = document.createElement('button');
  made.type = 'button';
  made.className = 'second';
  made.textContent = text;
  made.addEventListener('click', step);
  return made;
}

/** Waiting this long for the next step of a slider saves asking for what is passed over [ms]. */
const restMs = 120;

function takeOver(form: HTMLFormElement, select: HTMLSelectElement, view: HTMLElement): void {
  const words: Words = {
    earlier: form.dataset.earlier ?? '',
    later: form.dataset.later ?? '',
    slider: form.dataset.slider ?? '',
  };
  const source = form.dataset.source ?? '';
  const options = [...select.options];
  const known = new Map<string, string>([[select.value, view.innerHTML]]);
  let wanted = select.value;
  let waiting: number | undefined;

  const slider = document.createElement('input');
  slider.type = 'range';
  slider.min = '0';
  slider.max = String(options.length - 1);
  slider.setAttribute('aria-label', words.slider);
  const earlier = button(words.earlier, () => {
    go(select.selectedIndex - 1);
  });
  const later = button(words.later, () => {
    go(select.selectedIndex + 1);
  });

  async function show(key: string): Promise<void> {
    let html = known.get(key);
    if (html === undefined) {
      const answer = await fetch(`${source}${encodeURIComponent(key)}`);
      if (!answer.ok) {
        // The server may ask to sign in again: the form finds the way.
        form.submit();
        return;
      }
      html = await answer.text();
      known.set(key, html);
    }
    if (key === wanted) view.innerHTML = html;
  }

  function follow(): void {
    const option = options[select.selectedIndex];
    if (option === undefined) return;
    wanted = option.value;
    slider.value = String(select.selectedIndex);
    slider.setAttribute('aria-valuetext', option.text);
    earlier.disabled = select.selectedIndex === 0;
    later.disabled = select.selectedIndex === options.length - 1;
    moveMarks(Number(option.dataset.at), option.dataset.case ?? '');
    window.clearTimeout(waiting);
    waiting = window.setTimeout(() => void show(wanted), known.has(wanted) ? 0 : restMs);
  }

  function go(index: number): void {
    select.selectedIndex = Math.min(options.length - 1, Math.max(0, index));
    follow();
  }

  select.addEventListener('change', follow);
  slider.addEventListener('input', () => {
    go(Number(slider.value));
  });
  form.querySelector('button[type="submit"]')?.remove();
  const steps = document.createElement('div');
  steps.className = 'moment-steps';
  steps.append(earlier, slider, later);
  form.append(steps);
  follow();
}

function start(): void {
  const form = document.querySelector<HTMLFormElement>('form.moments');
  const select = form?.querySelector('select');
  const view = document.getElementById('moment-view');
  if (form && select && view) takeOver(form, select, view);
}

if (typeof document !== 'undefined') {
  start();
  // Results that come after the page bring their own form.
  document.addEventListener('results-shown', start);
}
