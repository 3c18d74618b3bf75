import type { History, Picture, Strip } from '../../core/view/history.ts';
import type { RunPaths } from '../../core/view/run-view.ts';
import type { Desk } from '../desk.ts';

/** What the server answered about one guarantee, each part with its own failure. */
export interface GuaranteeRecords {
  readonly history: History | undefined;
  readonly strip: Strip | undefined;
  readonly picture: Picture | undefined;
  readonly paths: RunPaths | undefined;
  readonly faults: readonly string[];
}

/** Asks for all at once; one that fails leaves the others. */
export async function guaranteeRecords(desk: Desk, id: string, from: number, to: number, points: number): Promise<GuaranteeRecords> {
  const [history, strip, picture, paths] = await Promise.allSettled([desk.history(id, from, to, points), desk.strip(id), desk.picture(id), desk.run(id)]);
  const faults = ([['history', history], ['strip of units', strip], ['picture', picture], ['path of the evidence', paths]] as const).flatMap(([name, answer]) =>
    answer.status === 'rejected' ? [`The ${name} could not be read: ${answer.reason instanceof Error ? answer.reason.message : String(answer.reason)}.`] : [],
  );
  return {
    history: history.status === 'fulfilled' ? history.value : undefined,
    strip: strip.status === 'fulfilled' ? strip.value : undefined,
    picture: picture.status === 'fulfilled' ? picture.value : undefined,
    paths: paths.status === 'fulfilled' ? paths.value : undefined,
    faults,
  };
}
