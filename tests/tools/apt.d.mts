export function runs(file: string): boolean;
export function aptInstall(name: string, called: string): boolean;
