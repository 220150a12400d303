/** The part of the File System Access API that TypeScript's library leaves out, because not every browser has it. */
interface FilePickerType {
  readonly description: string;
  readonly accept: Readonly<Record<string, readonly string[]>>;
}

interface Window {
  showOpenFilePicker?: (options: { readonly types: readonly FilePickerType[] }) => Promise<FileSystemFileHandle[]>;
  showSaveFilePicker?: (options: {
    readonly suggestedName: string;
    readonly types: readonly FilePickerType[];
  }) => Promise<FileSystemFileHandle>;
}

interface FileSystemHandle {
  requestPermission?: (what: { readonly mode: 'read' | 'readwrite' }) => Promise<PermissionState>;
}

interface DataTransferItem {
  getAsFileSystemHandle?: () => Promise<FileSystemHandle | null>;
}
