export type MenuItem =
  | {
      readonly text: string;
      /** Shortcut, for reading only. */
      readonly keys?: string;
      readonly hint?: string;
      readonly disabled?: boolean;
      /** Given for choices: shown with a tick when true. */
      readonly checked?: boolean;
      readonly run: () => void;
    }
  | { readonly heading: string };
