/**
 * Every place that names a target, in the plan it is defined in and in all that use that file, open or not.
 *
 * Must not know: what is done with the places.
 */
import { placesOf, type Target } from '../../answers/names-at.ts';
import type { Range } from '../../route/plan.ts';
import { normal, pathOf, uriOf } from '../places.ts';
import type { Result } from '../plans.ts';
import type { Session } from '../session.ts';

export interface Places {
  readonly uri: string;
  readonly ranges: readonly Range[];
  readonly result: Result;
}

/** Plans that are searched; a workspace of more is searched in part, which is said in the log. */
const MOST_PLANS = 500;

/** The plan asked from comes first; a label is only known in its own plan. */
export async function placesAcross(session: Session, from: Result, target: Target): Promise<Places[]> {
  const here = { uri: from.uri, ranges: placesOf(from.analysed.plan.document, target), result: from };
  if (target.kind === 'label') return [here];
  const home = normal(target.file === undefined ? from.uri : uriOf(from.root, target.file));
  const found = [here];
  for (const result of await others(session, from)) {
    const isHome = normal(result.uri) === home;
    if (!isHome && !means(result, target.name, home)) continue;
    const ranges = placesOf(result.analysed.plan.document, target);
    if (ranges.length !== 0) found.push({ uri: result.uri, ranges, result });
  }
  return found;
}

/** Whether the name stands for the compound of that file in another plan. */
function means({ analysed, root, uri }: Result, name: string, home: string): boolean {
  const compound = analysed.plan.compounds.find((each) => each.name === name);
  if (compound === undefined) return false;
  return normal(compound.file === undefined ? uri : uriOf(root, compound.file)) === home;
}

async function others(session: Session, from: Result): Promise<Result[]> {
  const results: Result[] = [];
  const seen = new Set([normal(from.uri)]);
  for (const uri of session.plans.open()) {
    if (seen.has(normal(uri))) continue;
    seen.add(normal(uri));
    const result = await session.plans.current(uri);
    if (result !== null) results.push(result);
  }
  const paths = new Set(await session.files.plans(from.root));
  for (const { file } of from.analysed.plan.compounds) if (file !== undefined) paths.add(file);
  if (MOST_PLANS < paths.size)
    session.log(`More than ${MOST_PLANS} plans; the first ${MOST_PLANS} are searched.`);
  for (const path of [...paths].slice(0, MOST_PLANS)) {
    const uri = uriOf(from.root, path);
    if (seen.has(normal(uri)) || pathOf(from.root, uri) !== path) continue;
    seen.add(normal(uri));
    const result = await session.plans.unopened(from.root, path);
    if (result !== null) results.push(result);
  }
  return results;
}
