/** Reads files and pastes away from the page, which stays awake: decoding, hashing, parsing, checking. */
import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex } from '@noble/hashes/utils.js';
import type { ReadingAnswer, ReadingRequest } from './reading-messages';
import { type OpenSource, openBytes, openText, understand } from './understand';

let open: { source: OpenSource; fileHash: string | null } | null = null;

/** By the browser itself where it may; addresses without https are not allowed to, and take some ten times as long. */
async function hashBytes(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  const digest = crypto.subtle ? await crypto.subtle.digest('SHA-256', bytes) : sha256(bytes);
  return bytesToHex(new Uint8Array(digest));
}

async function openSource(source: File | string): Promise<typeof open> {
  if (typeof source === 'string') return { source: openText(source), fileHash: null };
  const bytes = new Uint8Array(await source.arrayBuffer());
  const [fileHash, opened] = await Promise.all([hashBytes(bytes), openBytes(bytes)]);
  return { source: opened, fileHash };
}

async function answer(request: ReadingRequest): Promise<ReadingAnswer> {
  const { number, choices, thisMonth } = request;
  if (request.kind === 'open') {
    open = null;
    try {
      open = await openSource(request.source);
    } catch {
      return { kind: 'unreadable', number };
    }
  }
  if (!open) return { kind: 'unreadable', number };
  const understood = understand(open.source, choices, thisMonth);
  return { kind: 'understood', number, understood, fileHash: open.fileHash };
}

self.addEventListener('message', async (event: MessageEvent<ReadingRequest>) => {
  self.postMessage(await answer(event.data));
});
