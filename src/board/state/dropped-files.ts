// What was dropped on the page, with all that lies in dropped folders.

/** Deeper folders are not opened, nor more files than this: somebody let go of a whole disk. */
const DEEPEST = 8;
const MOST_FILES = 20_000;

/**
 * The files of a drop, folders opened, hidden files left out. Files out of folders are named with their way there.
 * Must be called while the drop is being dealt with; afterwards the browser tells nothing of it.
 */
export async function droppedFiles(transfer: DataTransfer): Promise<File[]> {
  const items = [...transfer.items].filter(({ kind }) => kind === 'file');
  if (items.length === 0) return [...transfer.files];
  const dropped = items.map((item) => ({ entry: item.webkitGetAsEntry(), file: item.getAsFile() }));
  const files: File[] = [];
  for (const { entry, file } of dropped) {
    if (entry?.isDirectory === true) await gather(entry as FileSystemDirectoryEntry, files, 0);
    else if (file !== null) files.push(file);
  }
  return files;
}

async function gather(folder: FileSystemDirectoryEntry, files: File[], depth: number): Promise<void> {
  if (depth > DEEPEST) return;
  const entries = await entriesOf(folder);
  entries.sort((a, b) => (a.name < b.name ? -1 : 1));
  for (const entry of entries) {
    if (entry.name.startsWith('.') || files.length >= MOST_FILES) continue;
    if (entry.isDirectory) await gather(entry as FileSystemDirectoryEntry, files, depth + 1);
    else files.push(await fileOf(entry as FileSystemFileEntry));
  }
}

/** All entries of a folder; the browser hands them out some at a time. */
async function entriesOf(folder: FileSystemDirectoryEntry): Promise<FileSystemEntry[]> {
  const reader = folder.createReader();
  const all: FileSystemEntry[] = [];
  for (;;) {
    const some = await new Promise<FileSystemEntry[]>((resolve, reject) => reader.readEntries(resolve, reject));
    if (some.length === 0) return all;
    all.push(...some);
  }
}

async function fileOf(entry: FileSystemFileEntry): Promise<File> {
  const file = await new Promise<File>((resolve, reject) => entry.file(resolve, reject));
  return new File([file], entry.fullPath.replace(/^\//u, ''), { type: file.type, lastModified: file.lastModified });
}
