export function findNgspice(): string | undefined;
export function ensureNgspice(): string | undefined;
