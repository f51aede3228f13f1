import { useEffect, useState } from 'react';
import { useController } from './controller-context';

/** The whole page takes a dropped file, and a paste made outside any text field. */
export function DropPlace() {
  const controller = useController();
  const [over, setOver] = useState(false);

  useEffect(() => {
    /** Entered elements under the pointer: the drag has left the page when none is left. */
    let depth = 0;
    const carriesFile = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false;
    const stops = new AbortController();
    const listen = <K extends keyof WindowEventMap>(
      type: K,
      listener: (event: WindowEventMap[K]) => void,
    ) => addEventListener(type, listener, { signal: stops.signal });

    listen('dragenter', (event) => {
      if (!carriesFile(event)) return;
      depth += 1;
      setOver(true);
    });
    listen('dragleave', (event) => {
      if (!carriesFile(event)) return;
      depth = Math.max(0, depth - 1);
      if (depth === 0) setOver(false);
    });
    listen('dragover', (event) => {
      if (carriesFile(event)) event.preventDefault();
    });
    listen('drop', (event) => {
      if (!carriesFile(event)) return;
      event.preventDefault();
      depth = 0;
      setOver(false);
      const file = event.dataTransfer?.files[0];
      if (file !== undefined) void controller.openFile(file);
    });
    listen('paste', (event) => {
      if (event.target instanceof Element && event.target.closest('input, textarea, select')) {
        return;
      }
      const text = event.clipboardData?.getData('text') ?? '';
      if (text.trim() !== '') controller.setText(text, 'replaced');
    });
    return () => stops.abort();
  }, [controller]);

  if (!over) return null;
  return (
    <div className="drop" aria-hidden="true">
      <p>Drop the file: its text becomes the case.</p>
    </div>
  );
}
