import type { IncomingFile } from '../store/add-files.ts';

interface DemoManifest {
  readonly survey: string;
  readonly targets: number;
  readonly totalBytes: number;
  readonly files: readonly { readonly name: string; readonly bytes: number }[];
}

/** The invented docket that comes with the app. */
export async function loadDemo(): Promise<readonly IncomingFile[]> {
  const manifest: DemoManifest = await (await fetchDemo('manifest.json')).json();
  return manifest.files.map(({ name }) => ({ name, bytes: async () => (await fetchDemo(name)).arrayBuffer() }));
}

async function fetchDemo(name: string): Promise<Response> {
  const response = await fetch(new URL(`demo/${name}`, document.baseURI));
  if (!response.ok) throw new Error(`${name} of the demo docket could not be fetched (${response.status})`);
  return response;
}
