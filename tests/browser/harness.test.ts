import { statSync } from 'node:fs';
import { expect, test } from 'vitest';
import { complaints, openEditor, shot } from './harness.ts';

test('the built editor opens and shows something', async () => {
  const page = await openEditor();
  expect(await page.title()).toContain('Spooltable');
  await page.locator('body').getByRole('main').first().waitFor();
  expect(statSync(await shot(page, 'open')).size).toBeGreaterThan(1000);
});

test('the harness hears what a page complains about', async () => {
  const page = await openEditor();
  await page.evaluate(async () => {
    console.error('told');
    setTimeout(() => {
      throw new Error('thrown');
    });
    await fetch('http://127.0.0.1:9/').catch(() => undefined);
  });
  const heard: string[] = [];
  for (const word of ['told', 'thrown', 'left this machine', 'failed:']) {
    await expect
      .poll(() => {
        heard.push(...complaints(page));
        return heard.join('; ');
      })
      .toContain(word);
  }
  await page.close();
  complaints(page);
});
