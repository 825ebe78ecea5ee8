const decimal = String.raw`[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d{1,3})?`;

/** `1.679`, `-1e-3`, `10/81`. */
export const decimalPattern = new RegExp(`^${decimal}(?:/${decimal})?$`);
