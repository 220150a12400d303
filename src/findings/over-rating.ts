import { beyond, isIntensified, ratingFinding } from './beyond-rating.ts';
import type { Rule } from './finding.ts';

/** Pressure of the pumps beyond what a part is built for. */
export const overRating: Rule = (evidence) =>
  beyond(evidence, (rating, pressure, source) => !rating.tankPort && !isIntensified(pressure, source)).map((found) =>
    ratingFinding(evidence, found, {
      rule: 'over-rating',
      title: (label) => `${label} stands above its rated pressure`,
      why: 'A relief valve set below the weakest part is what protects it.',
      remedy:
        'Usual remedies: a lower setting, a reducing valve before it, or a part that is built for more. Check the rating on its plate.',
    }),
  );
