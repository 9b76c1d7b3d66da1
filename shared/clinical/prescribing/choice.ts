import type { NotApplicable } from './answer';
import type { Findings } from './findings';
import type { Option } from './options';
import type { MaximumMethod, Method } from './request';

const firstMaximum: Readonly<Record<Method, MaximumMethod | null>> = {
  'heart-rate-reserve': 'measured',
  'percent-of-peak': 'measured',
  'observed-work': null,
  'resting-plus': null,
  'perceived-exertion': null,
};

/** What is proposed, best first; effort always applies. */
const proposals: readonly Method[] = ['heart-rate-reserve', 'observed-work', 'perceived-exertion'];

const optionOf = (
  options: readonly Option[],
  method: Method,
  maximum: MaximumMethod | null,
): Option | undefined =>
  options.find((option) => option.method === method && option.maximumMethod === maximum);

function proposed(options: readonly Option[]): Option {
  for (const method of proposals) {
    const option = optionOf(options, method, firstMaximum[method]);
    if (option?.applicable) return option;
  }
  throw new Error('unreachable: effort always applies');
}

/** A method that takes no such maximum. */
function mismatch(method: Method): NotApplicable {
  const message =
    method === 'percent-of-peak'
      ? 'Percent of peak takes the measured peak only: leave the maximum empty.'
      : 'This method takes no maximum: leave it empty.';
  return { code: 'not-applicable', path: 'choice.maximum', message };
}

/** The option that the clinician chose, else the one proposed; or why the choice does not apply. */
export function chosenOption(
  options: readonly Option[],
  { request: { choice }, blocks }: Findings,
): Option | NotApplicable {
  if (choice.method === null && choice.maximum === null) return proposed(options);
  const method = choice.method ?? 'heart-rate-reserve';
  const option = optionOf(options, method, choice.maximum ?? firstMaximum[method]);
  if (option === undefined) return mismatch(method);
  if (option.applicable) return option;
  const ofMethod = choice.maximum === null || (choice.method !== null && blocks.length > 0);
  return {
    code: 'not-applicable',
    path: ofMethod ? 'choice.method' : 'choice.maximum',
    message: option.why,
  };
}
