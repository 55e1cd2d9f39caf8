import { createRequire } from 'node:module';
import { readFileSync } from 'node:fs';
import type { Page } from 'playwright-core';

const source = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

/**
 * What axe-core finds wrong with the page as it stands, one line each; contrast included. Evaluated
 * through the debugger, which the content security policy of the page does not bind.
 */
export async function accessibilityFaults(page: Page): Promise<readonly string[]> {
  await page.evaluate(source);
  return page.evaluate(async () => {
    interface Axe {
      run(options: unknown): Promise<{
        violations: { id: string; help: string; nodes: { target: unknown[] }[] }[];
      }>;
    }
    const { axe } = globalThis as unknown as { axe: Axe };
    const { violations } = await axe.run({
      runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'],
    });
    return violations.map(
      ({ id, help, nodes }) =>
        `${id}: ${help} (${nodes.map(({ target }) => target.join(' ')).join('; ')})`,
    );
  });
}
