import { describe, expect, it } from 'vitest';
import { fetchedResults } from '../../../src/web/islands/waiting.js';

/** A server that gives these answers one after another; null is a lost connection. */
function server(...answers: (Response | null)[]) {
  const state = { asked: 0, rests: 0 };
  const ask = (): Promise<Response> => {
    const answer = answers[state.asked] ?? null;
    state.asked += 1;
    return answer === null ? Promise.reject(new TypeError('lost')) : Promise.resolve(answer);
  };
  const rest = (): Promise<void> => {
    state.rests += 1;
    return Promise.resolve();
  };
  return { state, results: () => fetchedResults('/results', ask, rest) };
}

describe('results that come after their page', () => {
  it('are asked for again as long as the server says not yet', async () => {
    const { state, results } = server(
      new Response('', { status: 202 }),
      new Response('', { status: 202 }),
      new Response('<p>Go</p>'),
    );
    expect(await results()).toBe('<p>Go</p>');
    expect(state).toEqual({ asked: 3, rests: 0 });
  });

  it('are asked for again after a pause when the connection was lost', async () => {
    const { state, results } = server(null, new Response('<p>Go</p>'));
    expect(await results()).toBe('<p>Go</p>');
    expect(state.rests).toBe(1);
  });

  it('are given up when the server refuses, and after ten lost connections', async () => {
    expect(await server(new Response('', { status: 500 })).results()).toBeNull();
    const lost = server();
    expect(await lost.results()).toBeNull();
    expect(lost.state.asked).toBe(10);
  });
});
