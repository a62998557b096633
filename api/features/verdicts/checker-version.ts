/** Goes up whenever the checker may rule on some derivation otherwise than before; kept with every verdict. */
export const CHECKER_VERSION = '3';
