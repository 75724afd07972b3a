import { useRef, type ReactNode } from 'react';
import { LAYOUT_FILE_ACCEPT } from './layout-files';

/** A button that asks for a layout file. The same file may be chosen again, once it has been mended. */
export function LayoutFileButton({
  onFile,
  disabled,
  children,
}: {
  onFile: (file: File) => void;
  disabled?: boolean;
  children: ReactNode;
}) {
  const chosen = useRef<HTMLInputElement>(null);
  return (
    <>
      <button
        type="button"
        className="button"
        disabled={disabled}
        onClick={() => chosen.current?.click()}
      >
        {children}
      </button>
      <input
        ref={chosen}
        type="file"
        className="sr-only"
        tabIndex={-1}
        aria-label="Layout file to open"
        accept={LAYOUT_FILE_ACCEPT}
        onChange={(event) => {
          const [file] = event.target.files ?? [];
          event.target.value = '';
          if (file) onFile(file);
        }}
      />
    </>
  );
}
