type Bound<Deps, Functions> = {
  readonly [Name in keyof Functions]: Functions[Name] extends (deps: Deps, ...args: infer Args) => infer Result
    ? (...args: Args) => Result
    : never;
};

/** A service: functions that take their dependencies first, with the dependencies given. */
export function bind<Deps, Functions extends Record<string, (deps: Deps, ...args: never[]) => unknown>>(
  deps: Deps,
  functions: Functions,
): Bound<Deps, Functions> {
  const bound = Object.entries(functions).map(([name, act]) => [name, (...args: never[]) => act(deps, ...args)]);
  return Object.fromEntries(bound) as Bound<Deps, Functions>;
}
