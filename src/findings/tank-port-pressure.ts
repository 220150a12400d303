import { beyond, ratingFinding } from './beyond-rating.ts';
import type { Rule } from './finding.ts';

/** What stands behind a valve presses on its tank port, which is often built for less. */
export const tankPortPressure: Rule = (evidence) =>
  beyond(evidence, (rating) => rating.tankPort).map((found) =>
    ratingFinding(evidence, found, {
      rule: 'tank-port-pressure',
      title: (label) => `The tank port of ${label} stands above its rated pressure`,
      why: 'Whatever moves behind it, in series, presses on its tank port.',
      remedy:
        'Usual remedies: carry-over sections instead of valves in series through T, a lower relief setting behind it, or a valve whose tank port is built for it.',
    }),
  );
