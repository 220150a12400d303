import type { Operator, ValveData } from '../circuit/model.ts';
import type { PartProblem } from './contract.ts';
import { pairKey, pairsOf, parsePath, type ValvePath } from './valve-paths.ts';

const PORT_ID = /^[A-Za-z][A-Za-z0-9_]*$/;

function repeated(values: readonly string[]): string[] {
  return [...new Set(values.filter((value, index) => values.indexOf(value) !== index))];
}

function checkPaths(data: ValveData, paths: readonly string[], where: string, place: string): PartProblem[] {
  const known = data.ports.map((port) => port.id);
  const problems: PartProblem[] = [];
  const seen = new Map<string, string>();
  paths.forEach((text, index) => {
    const here = `${where}[${index}]`;
    const parsed = parsePath(text, here);
    if (!parsed.ok) {
      problems.push(...parsed.problems);
      return;
    }
    const strange = parsed.value.ports.filter((id) => !known.includes(id));
    if (strange.length > 0) {
      problems.push({
        where: here,
        what: `Path "${text}" of ${place} names port ${strange.join(', ')}, which the valve does not have.`,
        remedy: `Its ports are ${known.join(', ')}.`,
      });
    }
    const twin = pairsOf(parsed.value)
      .map(pairKey)
      .map((key) => seen.get(key))
      .find((earlier) => earlier !== undefined);
    if (twin !== undefined) {
      problems.push({
        where: here,
        what: `Path "${text}" of ${place} is the same as "${twin}" or lies within it.`,
        remedy: 'Delete one of the two.',
      });
    }
    for (const key of pairsOf(parsed.value satisfies ValvePath).map(pairKey)) if (!seen.has(key)) seen.set(key, text);
  });
  return problems;
}

function checkShape(data: ValveData): PartProblem[] {
  const problems: PartProblem[] = [];
  const count = data.positions.length;
  if (count < 2 || count > 4) {
    problems.push({
      where: 'valve.positions',
      what: `The valve has ${count} position${count === 1 ? '' : 's'}.`,
      remedy: 'Give it 2 to 4.',
    });
  }
  const ways = data.ports.length;
  if (ways < 2 || ways > 8) {
    problems.push({
      where: 'valve.ports',
      what: `The valve has ${ways} way${ways === 1 ? '' : 's'}.`,
      remedy: 'Give it 2 to 8.',
    });
  }
  data.ports.forEach((port, index) => {
    if (!PORT_ID.test(port.id)) {
      problems.push({
        where: `valve.ports[${index}].id`,
        what: `"${port.id}" cannot be the name of a port.`,
        remedy: 'Use a letter, then letters or digits, such as P or T2.',
      });
    }
  });
  for (const id of repeated(data.ports.map((port) => port.id))) {
    problems.push({
      where: 'valve.ports',
      what: `Two ports are called ${id}.`,
      remedy: 'Give each port its own letter.',
    });
  }
  for (const name of repeated(data.positions.map((position) => position.name))) {
    problems.push({
      where: 'valve.positions',
      what: `Two positions are called "${name}".`,
      remedy: 'Give each position its own name.',
    });
  }
  data.positions.forEach((position, index) => {
    if (position.name.trim() === '') {
      problems.push({
        where: `valve.positions[${index}].name`,
        what: `Position ${index + 1} has no name.`,
        remedy: 'Name it, such as a, 0 or b.',
      });
    }
  });
  return problems;
}

function checkOperators(data: ValveData, follows: readonly Operator[]): PartProblem[] {
  const problems: PartProblem[] = [];
  const operators: Operator[] = [...data.left, ...data.right];
  const count = data.positions.length;
  const { rest } = data;
  const outside = (index: number): boolean => !Number.isInteger(index) || index < 0 || index >= count;
  if (rest !== undefined && outside(rest)) {
    problems.push({
      where: 'valve.rest',
      what: `The rest position is ${rest}, but the valve has positions 0 to ${count - 1}.`,
      remedy: 'Name one of them, or leave the rest position out for a detent.',
    });
  }
  if (rest !== undefined && !operators.includes('spring')) {
    problems.push({
      level: 'warning',
      where: 'valve.rest',
      what: 'The valve has a rest position, but no spring is drawn.',
      remedy: 'Add a spring, or leave the rest position out.',
    });
  }
  if (rest === undefined && operators.includes('spring')) {
    problems.push({
      level: 'warning',
      where: 'valve.rest',
      what: 'A spring is drawn, but the valve has no rest position and keeps its last one.',
      remedy: 'Say which position the spring returns to, or remove the spring.',
    });
  }
  if (!operators.some((operator) => operator !== 'spring' && operator !== 'detent')) {
    problems.push({
      level: 'warning',
      where: 'valve.left',
      what: 'Nothing is drawn that moves the valve.',
      remedy: 'Add a lever, a coil or another operator.',
    });
  }
  for (const operator of ['pilot', 'roller'] as const) {
    if (operators.includes(operator) && !follows.includes(operator)) {
      problems.push({
        level: 'warning',
        where: 'valve.left',
        what: `A ${operator} is drawn, but a directional valve is one that somebody commands: the table takes it as moved by hand.`,
        remedy: `Take a ${operator === 'pilot' ? 'pilot-operated or two-stage' : 'roller'} valve for one that moves by itself.`,
      });
    }
  }
  const coils = data.coils ?? [];
  coils.forEach((coil, index) => {
    if (outside(coil.position)) {
      problems.push({
        where: `valve.coils[${index}].position`,
        what: `Coil ${coil.name} leads to position ${coil.position}, which does not exist.`,
        remedy: `Name a position from 0 to ${count - 1}.`,
      });
    }
    if (coil.position === rest) {
      problems.push({
        level: 'warning',
        where: `valve.coils[${index}].position`,
        what: `Coil ${coil.name} leads to the rest position, where the spring puts the valve anyway.`,
        remedy: 'Bind the coil to another position.',
      });
    }
  });
  for (const name of repeated(coils.map((coil) => coil.name))) {
    problems.push({
      where: 'valve.coils',
      what: `Two coils are called "${name}".`,
      remedy: 'Give each coil its own name.',
    });
  }
  const drawn = operators.filter((operator) => operator === 'coil').length;
  if (drawn !== coils.length) {
    problems.push({
      level: 'warning',
      where: 'valve.coils',
      what: `${drawn} coil${drawn === 1 ? ' is' : 's are'} drawn, but ${coils.length} ${coils.length === 1 ? 'is' : 'are'} bound to a position.`,
      remedy: 'Draw and bind the same coils.',
    });
  }
  return problems;
}

/** Everything wrong with the data of a directional valve; `where` is relative to the part. `follows`: operators that move it by themselves. */
export function checkValve(data: ValveData, follows: readonly Operator[] = []): PartProblem[] {
  const paths = data.positions.flatMap((position, index) =>
    checkPaths(data, position.paths, `valve.positions[${index}].paths`, `position "${position.name}"`),
  );
  const crossovers = data.crossovers ?? [];
  const crossing = crossovers.flatMap((between, index) =>
    checkPaths(data, between, `valve.crossovers[${index}]`, `the crossover after position ${index + 1}`),
  );
  const many: PartProblem[] =
    crossovers.length > Math.max(0, data.positions.length - 1)
      ? [
          {
            where: 'valve.crossovers',
            what: `There are ${crossovers.length} crossovers between ${data.positions.length} positions.`,
            remedy: 'Give one less than there are positions.',
          },
        ]
      : [];
  return [...checkShape(data), ...paths, ...many, ...crossing, ...checkOperators(data, follows)];
}
