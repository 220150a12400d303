/** Physical quantities the program knows. Inside everything is SI. */
export type Quantity =
  | 'pressure' | 'flow' | 'length' | 'speed' | 'force' | 'torque' | 'power'
  | 'displacement' | 'volume' | 'area' | 'time' | 'temperature' | 'frequency' | 'ratio';
