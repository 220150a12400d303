import type { Rule } from './finding.ts';

/** A port with nothing on it counts as plugged, and is said once. */
export const openPort: Rule = ({ net }) =>
  net.openPorts.map((port) => {
    const part = net.parts[port.part];
    return {
      rule: 'open-port',
      level: port.level,
      title: `${part?.label ?? ''}.${port.port} is left open`,
      what: `${port.what} It is taken as plugged.`,
      remedy: port.remedy,
      parts: part ? [part.id] : [],
      lines: [],
      rows: [],
      rowCount: 0,
    };
  });
