/**
 * Fetches the results of a plan whose page was sent before they were there. The page says so without
 * this file too, and offers a link that asks again.
 */

/** Between two questions after a fault of the connection [ms]. */
const pauseMs = 3000;
const mostFaults = 10;

const pause = (ms: number): Promise<void> =>
  new Promise((resolve) => {
    window.setTimeout(resolve, ms);
  });

/** The results as HTML, or null when the server cannot be asked any more. */
export async function fetchedResults(
  source: string,
  ask: (source: string) => Promise<Response> = fetch,
  rest: (ms: number) => Promise<void> = pause,
): Promise<string | null> {
  for (let faults = 0; faults < mostFaults;) {
    try {
      const answer = await ask(source);
      // 202: not yet; the server has held the question as long as it may.
      if (answer.status === 202) continue;
      if (answer.ok && !answer.redirected) return await answer.text();
      return null;
    } catch {
      faults += 1;
      await rest(pauseMs);
    }
  }
  return null;
}

async function replace(waiting: HTMLElement, part: HTMLElement): Promise<void> {
  const { source = '', meanwhile = '', done = '', lost = '' } = waiting.dataset;
  const hint = waiting.querySelector('.hint');
  hint?.replaceChildren(meanwhile);
  const html = await fetchedResults(source);
  const said = document.getElementById('results-said');
  if (html === null) {
    hint?.replaceChildren(lost);
    if (said) said.textContent = lost;
    return;
  }
  part.innerHTML = html;
  if (said) said.textContent = done;
  document.dispatchEvent(new Event('results-shown'));
}

if (typeof document !== 'undefined') {
  const waiting = document.querySelector<HTMLElement>('.waiting');
  const part = document.getElementById('results-part');
  if (waiting && part) void replace(waiting, part);
}
