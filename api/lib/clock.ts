/** The present instant; handed to everything that asks for the time, so that tests can set it. */
export type Now = () => Date;

export const systemClock: Now = () => new Date();
