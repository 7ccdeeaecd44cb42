/** Source of a regular expression for a decimal number as people write it: `2`, `2.2`, `.5`, `3e-9`. */
export const numeral = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`
