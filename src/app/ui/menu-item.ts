export type MenuItem =
  | {
      readonly text: string;
      /** Shortcut, for reading only. */
      readonly keys?: string;
      readonly hint?: string;
      readonly disabled?: boolean;
      /** One of several of which one is chosen: shown with a tick when true. */
      readonly checked?: boolean;
      /** Something that is on or off by itself: shown with a tick when on. */
      readonly on?: boolean;
      readonly run: () => void;
    }
  /** Begins a group of what follows, up to the next heading. */
  | { readonly heading: string };
