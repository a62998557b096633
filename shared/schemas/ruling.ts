/** What a ruling changed, kept before and after in the trail. */
export interface RulingTrail {
  readonly outcome: 'sound' | 'faulty' | 'undecided';
  readonly firstFault: number | null;
  readonly verdictId: string | null;
  readonly scores: readonly { readonly reviewId: string; readonly points: number; readonly counted: boolean }[];
}
