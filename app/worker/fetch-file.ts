/** A packed ephemeris file could not be had. */
class EphemerisFileError extends Error {
  readonly code = 'ephemeris-file';
  override name = 'EphemerisFileError';
}

/** Bytes of a packed ephemeris file, fetched from beside the page by a worker named after its base. */
export async function fetchFile(name: string): Promise<ArrayBuffer> {
  // The page names its worker after its own base: the files lie beside the page, not the script.
  const url = new URL(`ephemeris/${name}`, self.name);
  const answer = await fetch(url);
  const isPage = answer.headers.get('content-type')?.startsWith('text/html') ?? false;
  if (!answer.ok || isPage) {
    throw new EphemerisFileError(
      `The ephemeris file ${url.pathname} could not be fetched (${answer.status} ${answer.statusText}). It belongs beside the page, in ephemeris/.`,
    );
  }
  return answer.arrayBuffer();
}
