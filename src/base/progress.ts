/** Called by long work with the share done (0 to 1) and a short word for the stage; never more than some 100 times. */
export type ReportProgress = (share: number, stage: string) => void;

/** For callers that do not watch. */
export const unwatched: ReportProgress = () => undefined;

/** For a part of some work: passes its shares on as those between `from` and `to` of the whole. */
export function partOf(progress: ReportProgress, from: number, to: number): ReportProgress {
  return (share, stage) => progress(from + (to - from) * share, stage);
}

/** Times that one loop reports at most. */
const reportsOfLoop = 30;

/** For a loop over `count` things: told each index, it reports some of them as a share of the count. */
export function countWatch(count: number, stage: string, progress: ReportProgress): (index: number) => void {
  const step = Math.max(1, Math.ceil(count / reportsOfLoop));
  return (index) => {
    if (index % step === 0) progress(index / count, stage);
  };
}
