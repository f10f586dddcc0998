import type { Scenario } from '../scenario';
import { healthy } from './healthy';
import { sensors } from './sensors';
import { troubled } from './troubled';

/** Every scenario by its name. */
export const scenarios: Readonly<Record<string, Scenario>> = Object.fromEntries([...healthy, ...troubled, ...sensors].map((scenario) => [scenario.name, scenario]));

/** The scenario of that name. @throws RangeError that names those there are. */
export function scenarioNamed(name: string): Scenario {
  const found = Object.hasOwn(scenarios, name) ? scenarios[name] : undefined;
  if (!found) throw new RangeError(`There is no scenario "${name}". There are: ${Object.keys(scenarios).join(', ')}.`);
  return found;
}
