// The invented nights that the page opens with, where they are served beside the page.

import type { OpenFile } from '../worker/protocol.ts';

export interface DemoNight {
  readonly id: string;
  readonly title: string;
  /** Paths below the demo's folder. */
  readonly site: string;
  readonly files: readonly string[];
  /** Files with a farm's actual output. */
  readonly outputs?: readonly string[];
  /** The moment at which the night opens, ISO 8601. */
  readonly now: string;
}

export interface DemoList {
  /** The night that the page opens with. */
  readonly opens: string;
  readonly nights: readonly DemoNight[];
}

export interface Demo {
  readonly site: { readonly text: string; readonly name: string };
  readonly files: readonly OpenFile[];
  readonly nowMs: number;
}

const FOLDER = './demo/';

/** The nights on offer; none where no demo is served, which is no fault: the page then waits for files. */
export async function listDemo(): Promise<DemoList> {
  const response = await fetch(`${FOLDER}manifest.json`).catch(() => null);
  const isJson = response?.headers.get('content-type')?.includes('json') === true;
  if (response?.ok !== true || !isJson) return { opens: '', nights: [] };
  return (await response.json()) as DemoList;
}

/** @throws Error when a file of the night is not served */
export async function fetchDemo(night: DemoNight): Promise<Demo> {
  const [site, ...blobs] = await Promise.all([night.site, ...night.files, ...(night.outputs ?? [])].map(fetchBlob));
  return {
    site: { text: await site!.text(), name: plainName(night.site) },
    files: [...night.files, ...(night.outputs ?? [])].map((path, index) => ({
      name: plainName(path),
      blob: blobs[index]!,
    })),
    nowMs: Date.parse(night.now),
  };
}

function plainName(path: string): string {
  return path.slice(path.lastIndexOf('/') + 1);
}

async function fetchBlob(path: string): Promise<Blob> {
  const response = await fetch(FOLDER + path);
  if (!response.ok) throw new Error(`The demo file ${path} is not served (${response.status}).`);
  return response.blob();
}
