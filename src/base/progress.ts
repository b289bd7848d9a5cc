/** Called by long work with the share done (0 to 1) and a short word for the stage; never more than some 100 times. */
export type ReportProgress = (share: number, stage: string) => void;

/** For callers that do not watch. */
export const unwatched: ReportProgress = () => undefined;
