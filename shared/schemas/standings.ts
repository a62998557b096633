/** What a weekly sheet of standings keeps; nothing here but `listed` reaches the class. */
export interface StandingsBody {
  /** The upper third, best first; places count among those shown. Ties share a place. */
  readonly listed: readonly {
    readonly userId: string;
    readonly alias: string;
    readonly place: number;
    readonly standing: number;
  }[];
  /** Why there is no list, where there is none. */
  readonly withheld: 'too-few' | 'no-spread' | 'off' | null;
  readonly reviewers: number;
}
