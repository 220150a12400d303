import { isCoilTag } from '../base/coil-names.ts';
import { labelOf, type Circuit, type Part } from './model.ts';
import { RefusedEdit } from './refused.ts';

const tagsOf = ({ valve }: Part): string[] => (valve?.coils ?? []).map(({ name }) => name).filter(isCoilTag);

/** Tags of coils, not their letters, in circuit order. */
export const coilTags = ({ parts }: Circuit): string[] => parts.flatMap(tagsOf);

/** Refuses a tag that a coil of another valve has. */
export function checkCoilTag({ parts }: Circuit, partId: string, name: string): void {
  const other = parts.find((part) => part.id !== partId && tagsOf(part).includes(name));
  if (other)
    throw new RefusedEdit(
      'valve coils',
      `${labelOf(other)} has a coil tagged "${name}".`,
      'Give each coil of the circuit a tag of its own, or one letter.',
    );
}
