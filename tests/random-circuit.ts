import fc from 'fast-check';
import type { Circuit, Connection, Part } from '../src/circuit/model.ts';
import { CATALOGUE } from '../src/parts/catalogue.ts';
import type { PartKind } from '../src/parts/contract.ts';

const PLENTY = [
  'directional-valve',
  'cylinder',
  'directional-valve',
  'check-valve',
  'throttle',
  'lock-check',
  'directional-valve',
];

/**
 * Circuits joined at random: nobody would build most of them, which is the point. Every kind of the
 * catalogue occurs but valves that move by themselves, unless `kinds` has them; `mostInputs` bounds the number of combinations.
 */
export function randomCircuit(
  mostInputs = 4,
  mostParts = 12,
  kinds: readonly PartKind[] = CATALOGUE.filter((kind) => !kind.dependent),
  plenty: readonly string[] = PLENTY,
): fc.Arbitrary<Circuit> {
  return fc
    .tuple(
      fc.array(fc.tuple(fc.nat({ max: kinds.length + plenty.length - 1 }), fc.nat()), {
        minLength: 3,
        maxLength: mostParts,
      }),
      fc.array(fc.tuple(fc.nat(), fc.nat()), { minLength: 4, maxLength: 2 * mostParts }),
    )
    .map(([picks, pairs]) => {
      const parts: Part[] = [make('PUMP', 'fixed-pump', 0), make('TANK', 'tank', 0), make('RELIEF', 'relief-valve', 0)];
      let inputs = 0;
      picks.forEach(([kindIndex, formIndex], i) => {
        const kind = kinds[kindIndex]?.kind ?? plenty[kindIndex - kinds.length] ?? 'junction';
        const part = make(`N${i}`, kind, formIndex);
        if (kindNamed(kind).input?.(part)) {
          if (inputs === mostInputs) return;
          inputs += 1;
        }
        parts.push(part);
      });
      const ports = parts.flatMap((part) =>
        kindNamed(part.kind)
          .ports(part)
          .map((port) => ({ part: part.id, port: port.id })),
      );
      const connections: Connection[] = [];
      pairs.forEach(([a, b], i) => {
        const from = ports[a % ports.length];
        const to = ports[b % ports.length];
        if (from && to && from !== to) connections.push({ id: `c${i}`, from, to });
      });
      return { name: 'random', parts, connections };
    });
}

function make(id: string, kind: string, form: number): Part {
  const forms = kindNamed(kind).readyMade;
  return { id, kind, ...forms[form % forms.length]?.make() };
}

function kindNamed(name: string): PartKind {
  const kind = CATALOGUE.find((entry) => entry.kind === name);
  if (!kind) throw new Error(`no kind ${name}`);
  return kind;
}
