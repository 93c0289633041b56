import type * as tf from '@tensorflow/tfjs';
import { CheckpointError } from '../errors.js';
import { shapeText } from '../tensor/checks.js';
import type { StoredTensor } from './safetensors.js';

const dtypes = { F32: 'float32', I32: 'int32', BOOL: 'bool' } as const;

/** Refuses a file whose tensors do not fit, name by name, and says which differ. */
export function matchTensors(
  where: string,
  wanted: ReadonlyMap<string, tf.Tensor>,
  stored: ReadonlyMap<string, StoredTensor>,
): void {
  const faults: string[] = [];
  for (const [name, tensor] of wanted) {
    const held = stored.get(name);
    if (!held) faults.push(`no ${name} in the file`);
    else if (shapeText(held.shape) !== shapeText(tensor.shape)) {
      faults.push(
        `${name} of shape ${shapeText(held.shape)} in the file and ${shapeText(tensor.shape)} here`,
      );
    } else if (dtypes[held.dtype] !== tensor.dtype) {
      faults.push(`${name} of type ${dtypes[held.dtype]} in the file and ${tensor.dtype} here`);
    }
  }
  for (const name of stored.keys()) if (!wanted.has(name)) faults.push(`no ${name} here`);
  if (faults.length === 0) return;
  const shown = faults.slice(0, 3).join('; ');
  const more = faults.length > 3 ? `; and ${faults.length - 3} more` : '';
  throw new CheckpointError(
    `${where}: the file must be made for these variables; got ${shown}${more}; resume with the model that was saved`,
  );
}
