import { createRequire } from 'node:module';
import { expect, test } from 'vitest';

interface Lock {
  readonly packages: Readonly<Record<string, { version?: string; integrity?: string; optional?: boolean }>>;
}
const setUp = createRequire(import.meta.url)('./set-up.cjs') as {
  nodeTooOld: (version: string) => string | undefined;
  notInstalled: (lock: Lock, installed: Lock | undefined) => string | undefined;
};

// The bounds that the build tool states for itself: ^20.19.0 || >=22.12.0.
test.each(['v20.19.0', 'v20.20.2', 'v22.12.0', 'v23.0.0', 'v24.1.0'])('%s will do', (version) => {
  expect(setUp.nodeTooOld(version)).toBeUndefined();
});
test.each(['v0.12.18', 'v8.17.0', 'v18.20.0', 'v20.18.3', 'v21.7.3', 'v22.11.0'])('%s is too old', (version) => {
  expect(setUp.nodeTooOld(version)).toMatch(new RegExp(`^Spooltable needs Node.js 20.19 .*${version}[^\\n]*$`));
});

test('packages are installed when something is missing or differs, and not otherwise', () => {
  const lock: Lock = {
    packages: { '': {}, a: { version: '1', integrity: 'x' }, b: { version: '2', optional: true } },
  };
  expect(setUp.notInstalled(lock, undefined)).toBeTypeOf('string');
  expect(setUp.notInstalled(lock, { packages: {} })).toBe('a is missing');
  expect(setUp.notInstalled(lock, { packages: { a: { version: '0', integrity: 'w' } } })).toBe(
    'a differs from the lock',
  );
  expect(setUp.notInstalled(lock, { packages: { a: { version: '1', integrity: 'x' } } })).toBeUndefined();
});
