import type { CellInput, CellJob } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import { type Complaint, readNetwork } from '@stillroom/shared/notation';
import type { EngineControl } from './control.ts';
import { CellFailure } from './failure.ts';
import { inputOf } from './inputs.ts';

/** A network as a job gives it. */
export interface GivenNetwork {
  readonly network: Network;
  /** Its canonical text. */
  readonly text: string;
  /** What is doubtful in it, in words. */
  readonly warnings: readonly string[];
}

const wordsOf = ({ message, hint }: Complaint): string => (hint === null ? message : `${message} ${hint}`);

/** The first error of a network text, at its place in the text as its author sees it. */
function firstError(source: Pick<CellInput, 'text' | 'written'>): Complaint | undefined {
  const complaints = [source.written, source.text].flatMap((text) =>
    text === undefined ? [] : readNetwork(text).complaints,
  );
  return complaints.find(({ severity }) => severity === 'error');
}

function read(
  source: Pick<CellInput, 'text' | 'written'>,
  control: EngineControl,
  name: string | null,
): GivenNetwork {
  const { network, complaints } = (control.readNetwork ?? readNetwork)(source.text);
  if (network !== null) return { network, text: source.text, warnings: complaints.map(wordsOf) };
  const error = firstError(source);
  const hint = error?.hint ?? null;
  if (name === null) {
    throw new CellFailure(error?.message ?? 'This network cannot be read.', {
      ...(error === undefined ? {} : { line: error.line, column: error.column }),
      ...(hint === null ? {} : { hint }),
    });
  }
  const place = error === undefined ? '' : ` Line ${error.line}: ${error.message}`;
  throw new CellFailure(`${name} cannot be read.${place}`, hint === null ? {} : { hint });
}

/** The network that a network cell itself holds. @throws CellFailure where it cannot be read, with its place */
export const ownNetwork = (job: CellJob, control: EngineControl): GivenNetwork => read(job, control, null);

/**
 * The network that a cell draws on under a name.
 *
 * @throws CellFailure where there is none, or it cannot be read
 */
export function drawnNetwork(job: CellJob, control: EngineControl, name: string): GivenNetwork {
  const input = inputOf(job, name.normalize('NFC'));
  if (input === undefined) throw new CellFailure(`There is no cell called ${name}.`);
  return read(input, control, name);
}
