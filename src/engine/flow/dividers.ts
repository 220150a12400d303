import type { NetDivider } from '../../network/network.ts';
import type { FlowBuilder } from './builder.ts';

/** Pa between the ports of a gear section at which its slip is given. */
export const SLIP_AT = 100e5;

/**
 * A flow divider as the solver sees it; the branch that stands for the way to each outlet, −1 where none does.
 *
 * Spool: a fixed orifice in the way to each outlet, sized for its share, and behind it a throttle that the spool
 * shuts as far as the pressure behind its orifice falls below that behind the other one. The orifices so get the same
 * drop, and the flows their ratio, except for what it takes to move the spool: `rest`² of the rated drop, which is why
 * an outlet passes `rest` of its rated flow when the other passes nothing.
 *
 * Gear: one shaft, so that the flows are in a fixed ratio and Σ share · outlet pressure is the inlet pressure less the
 * loss; beside it each section slips `rest` of its rated flow at 100 bar between its ports.
 */
export function layDivider(
  builder: FlowBuilder,
  divider: NetDivider,
  at: (line: number) => number,
  label: string,
): readonly [number, number] {
  const { share, rest, rated, ports } = divider;
  const inlet = at(divider.inlet);
  const shares = [share, 1 - share] as const;
  const outlets = [at(divider.outlets[0]), at(divider.outlets[1])] as const;
  if (divider.form === 'gear') {
    builder.divider(label, inlet, outlets, share, rated.drop / rated.flow);
    outlets.forEach((outlet, i) => {
      if (outlet !== inlet)
        builder.leakage(
          `${label} slip ${ports[i + 1] ?? ''}`,
          inlet,
          outlet,
          (rest * (shares[i] as number) * rated.flow) / SLIP_AT,
        );
    });
    return [-1, -1];
  }
  const chambers = outlets.map((_, i) => builder.line(`${label} behind the orifice of ${ports[i + 1] ?? ''}`));
  const way = (i: 0 | 1): number => {
    const own = chambers[i] as number;
    const other = chambers[1 - i] as number;
    const flow = shares[i] * rated.flow;
    builder.throttle(`${label} orifice ${ports[i + 1] ?? ''}`, inlet, own, { flow, drop: rated.drop });
    const band = rest * rest * rated.drop;
    const law = { setting: -band, gradient: band / (2 * flow) };
    const toward = (sign: 1 | -1): { line: number; factor: number }[] => [
      { line: own, factor: sign },
      { line: other, factor: -sign },
    ];
    const name = ports[i + 1] ?? '';
    if (divider.combines) builder.pressureValve(`${label} ${name}–${ports[0]}`, outlets[i], own, toward(-1), law);
    return builder.pressureValve(`${label} ${ports[0]}–${name}`, own, outlets[i], toward(1), law);
  };
  return [way(0), way(1)];
}
