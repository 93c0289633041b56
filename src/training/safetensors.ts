import { CheckpointError } from '../errors.js';
import { shapeText } from '../tensor/checks.js';

/** Bytes per element of the element types that tfjs tensors can have. */
const elementBytes = { F32: 4, I32: 4, BOOL: 1 } as const;

/** An element type as the format names it. */
export type StoredType = keyof typeof elementBytes;

/** A named tensor's type, shape and little-endian bytes. */
export interface StoredTensor {
  readonly dtype: StoredType;
  readonly shape: readonly number[];
  readonly bytes: Uint8Array;
}

/** What a safetensors file holds. */
export interface StoredTensors {
  readonly metadata: Readonly<Record<string, string>>;
  readonly tensors: ReadonlyMap<string, StoredTensor>;
}

/**
 * Lays tensors out in the open safetensors format: the header's length as 8 little-endian bytes, a JSON header
 * with each tensor's `dtype`, `shape` and `data_offsets` and string metadata under `__metadata__`, then the
 * raw values without gaps.
 */
export function encodeSafetensors({ metadata, tensors }: StoredTensors): Uint8Array {
  const header: Record<string, unknown> = { __metadata__: metadata };
  let size = 0;
  for (const [name, tensor] of tensors) {
    const end = size + tensor.bytes.length;
    header[name] = { dtype: tensor.dtype, shape: tensor.shape, data_offsets: [size, end] };
    size = end;
  }
  const text = new TextEncoder().encode(JSON.stringify(header));
  // Readers may map the values in place, which wants them aligned; the format allows trailing spaces for this.
  const length = Math.ceil(text.length / 8) * 8;
  const bytes = new Uint8Array(8 + length + size);
  new DataView(bytes.buffer).setBigUint64(0, BigInt(length), true);
  bytes.fill(0x20, 8, 8 + length);
  bytes.set(text, 8);
  let at = 8 + length;
  for (const tensor of tensors.values()) {
    bytes.set(tensor.bytes, at);
    at += tensor.bytes.length;
  }
  return bytes;
}

function refuse(where: string, got: string, cause?: unknown): never {
  throw new CheckpointError(
    `${where}: the file must be a whole safetensors file; got ${got}; use an earlier checkpoint`,
    { cause },
  );
}

/** Reads the safetensors format, refusing anything that breaks its rules. */
export function decodeSafetensors(where: string, bytes: Uint8Array): StoredTensors {
  if (bytes.length < 8) refuse(where, `${bytes.length} bytes, too few for a header`);
  const length = new DataView(bytes.buffer, bytes.byteOffset, 8).getBigUint64(0, true);
  if (length > BigInt(bytes.length - 8)) {
    refuse(where, `${bytes.length} bytes where the header alone takes ${length + 8n}: truncated or damaged`);
  }
  const start = 8 + Number(length);
  let header: unknown;
  try {
    header = JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes.subarray(8, start)));
  } catch (cause) {
    refuse(where, 'a damaged header', cause);
  }
  if (typeof header !== 'object' || header === null || Array.isArray(header))
    refuse(where, 'a damaged header');
  const { __metadata__: metadata = {}, ...entries } = header as Record<string, unknown>;
  if (
    typeof metadata !== 'object' ||
    metadata === null ||
    Object.values(metadata).some((v) => typeof v !== 'string')
  ) {
    refuse(where, 'damaged metadata');
  }
  const tensors = new Map<string, StoredTensor>();
  let at = 0;
  for (const [name, entry] of Object.entries(entries)) {
    const { dtype, shape, begin, end } = readEntry(where, name, entry);
    const size = shape.reduce((product, side) => product * side, elementBytes[dtype]);
    if (begin !== at || end - begin !== size) {
      refuse(
        where,
        `bytes ${begin} to ${end} for ${name} of type ${dtype} and shape ${shapeText(shape)}: a damaged header`,
      );
    }
    at = end;
    tensors.set(name, { dtype, shape, bytes: bytes.subarray(start + begin, start + end) });
  }
  if (at !== bytes.length - start) {
    refuse(where, `${bytes.length} bytes where the header announces ${start + at}: truncated or damaged`);
  }
  return { metadata: metadata as Record<string, string>, tensors };
}

function readEntry(where: string, name: string, entry: unknown) {
  const { dtype, shape, data_offsets: offsets } = (entry ?? {}) as Record<string, unknown>;
  const counts = (list: unknown): list is number[] =>
    Array.isArray(list) && list.every((n) => Number.isSafeInteger(n) && n >= 0);
  if (!counts(shape) || !counts(offsets) || offsets.length !== 2)
    refuse(where, `a damaged entry for ${name}`);
  if (typeof dtype !== 'string' || !Object.hasOwn(elementBytes, dtype)) {
    refuse(where, `the element type ${String(dtype)} for ${name}, where F32, I32 or BOOL is due`);
  }
  return { dtype: dtype as StoredType, shape, begin: offsets[0]!, end: offsets[1]! };
}
