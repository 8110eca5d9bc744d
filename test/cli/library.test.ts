import { afterAll, beforeAll, expect, it } from 'vitest';
import { openWorkplace, type Workplace } from './program.js';
import { asOf, returnsCsv, shipmentsCsv } from './records.js';

const built = (path: string) => new URL(`../../dist/${path}`, import.meta.url).href;

let place: Workplace;
beforeAll(() => {
  place = openWorkplace();
  place.put('s.csv', shipmentsCsv());
  place.put('r.csv', returnsCsv());
});
afterAll(() => place.remove());

it('another program makes the same month end with the library and its effects on Node', async () => {
  const library: typeof import('../../src/index.js') = await import(built('index.js'));
  const node: typeof import('../../src/cli/node.js') = await import(built('cli/node.js'));
  const settings = {
    asOf,
    draws: 200,
    candidates: ['exponential'],
    shipments: { files: ['s.csv'] },
    returns: { files: ['r.csv'] },
  };
  place.put('returnfall.json', JSON.stringify(settings));
  const config = library.resolveConfig(library.readSettings(JSON.stringify(settings), 'returnfall.json'), {});
  const steps = new Set<string>();
  const effects = node.nodeEffects({ base: place.path(''), progress: (step) => steps.add(step) });
  const result = await library.monthEnd(config, 'forecast', effects);
  effects.close();
  const { table, fit, forecast } = result;
  const pages = library.renderReport(
    { table, fit, forecast, settings: config, version: '0' },
    effects.templates(),
    { singleFile: true },
  );
  expect([...pages.keys()]).toEqual(['index.html']);
  expect([...steps]).toContain('fitting products');
  const ended = await place.run(['forecast', '--json', '--quiet']);
  expect(ended).toEqual({ code: 0, stdout: library.outputFiles(result).get('forecast.json'), stderr: '' });
});
