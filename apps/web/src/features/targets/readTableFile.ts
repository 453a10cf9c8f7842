import { MAX_IMPORT_CHARACTERS } from '@faintward/contracts/targets';

/** Largest file that is read at all: what the server accepts as a table. */
const maxTableBytes = MAX_IMPORT_CHARACTERS;

export type TableFile = { ok: true; text: string } | { ok: false; message: string };

/** A file's text, or why it is none. Looked at before anything is sent. */
export async function readTableFile(file: Pick<File, 'name' | 'size' | 'arrayBuffer'>): Promise<TableFile> {
  if (file.size > maxTableBytes) {
    const megabytes = Math.ceil(file.size / 1e6);
    return {
      ok: false,
      message: `${file.name} has ${megabytes} MB; a table may have at most ${maxTableBytes / 1e6} MB. Leave out columns that are not needed, or split it.`,
    };
  }
  let bytes: ArrayBuffer;
  try {
    bytes = await file.arrayBuffer();
  } catch (error) {
    console.warn(error);
    return { ok: false, message: `${file.name} could not be read. Was it moved or is it open elsewhere?` };
  }
  try {
    const text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    if (!text.includes('\0')) return { ok: true, text };
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    // Not UTF-8: the message below says so.
  }
  return {
    ok: false,
    message: `${file.name} is not a text file in UTF-8. A spreadsheet can save one as “CSV UTF-8”.`,
  };
}
