import { beyond, isIntensified, ratingFinding } from './beyond-rating.ts';
import type { Rule } from './finding.ts';

/** Pressure beyond a rating that no pump gives. */
export const intensified: Rule = (evidence) =>
  beyond(evidence, (rating, pressure, source) => !rating.tankPort && isIntensified(pressure, source)).map((found) =>
    ratingFinding(evidence, found, {
      rule: 'intensified',
      title: (label) => `${label} stands above its rated pressure, and above every pump`,
      why: 'The ratio of areas or a load lifts it there: p(rod side) = (p·A + pull)/a. The relief valve at the pump does not see it.',
      remedy:
        'Usual remedies: meter in instead of out, a relief valve on that line close to the cylinder, or a counterbalance valve with its own relief.',
    }),
  );
