/** What one lever move does to the state, or what happens on the way; `text` for people. */
export interface MoveEffect {
  readonly kind:
    | 'drops'
    | 'springs'
    | 'starts'
    | 'stops'
    | 'turns round'
    | 'lets go'
    | 'changes'
    | 'pump'
    | 'valve'
    | 'traps'
    | 'vents';
  readonly text: string;
  /** Indices of lines in the table. */
  readonly lines: readonly number[];
  /** Part ids. */
  readonly parts: readonly string[];
}

/** What happens for a moment while the valve shifts. */
export interface MoveNote {
  readonly kind:
    | 'dead-headed'
    | 'over relief'
    | 'dips'
    | 'jerks'
    | 'halts'
    | 'frees'
    | 'open'
    | 'lost'
    | 'let down'
    | 'kept'
    | 'spreads'
    | 'shut in'
    | 'joined';
  readonly text: string;
  readonly lines: readonly number[];
  readonly parts: readonly string[];
}

/** On the way between two positions, or through one that is passed. */
export interface MoveStage {
  readonly kind: 'crossing' | 'passing';
  /** Names of the positions on both sides; of a passed one its own. */
  readonly names: readonly string[];
  /** False: the crossover is not drawn. `notes` then hold whatever is open on the way, between all shut and all joined as far as these two tell. */
  readonly known: boolean;
  readonly notes: readonly MoveNote[];
  /** Not drawn: what happens only if all ways are shut on the way, only if all are joined. */
  readonly ifShut: readonly MoveNote[];
  readonly ifJoined: readonly MoveNote[];
}

export interface LeverMove {
  readonly input: number;
  readonly part: string;
  readonly label: string;
  readonly from: string;
  readonly to: string;
  /** Index of the position that it leads to. */
  readonly position: number;
  /** All positions after it. */
  readonly positions: readonly number[];
  /** 0-based row that it leads to; absent where there are too many to be counted exactly. */
  readonly row?: number;
  /** A spring takes it back to this position when it is let go. */
  readonly springsTo?: string;
  readonly effects: readonly MoveEffect[];
  /** Only those stages in which something is to be said. */
  readonly stages: readonly MoveStage[];
  /** A spool that follows by pilot pressure: what it does as it shifts is not worked out. */
  readonly follows: boolean;
}

/** Every move of one lever from one state, the pumps as in the conditions. */
export interface MovesAnswer {
  readonly positions: readonly number[];
  readonly row?: number;
  readonly moves: readonly LeverMove[];
}

/** Which lever moves open a line to tank. */
export interface VentAnswer {
  readonly line: number;
  readonly name: string;
  readonly positions: readonly number[];
  readonly row?: number;
  /** `now`: it is open to tank already. `never`: in no combination of positions. */
  readonly outcome: 'now' | 'moves' | 'never';
  /** It stays fed and open to tank at once: what stands in it is what the flow to tank needs. */
  readonly flows: boolean;
  /** It comes down only through the leakage of a stopped pump. */
  readonly slow: boolean;
  /** A shortest list, in an order with few loads coming down on the way. */
  readonly steps: readonly LeverMove[];
  /** Other lists of the same length, each as positions of levers; cut at a few. */
  readonly others: readonly (readonly { readonly label: string; readonly to: string }[])[];
}
