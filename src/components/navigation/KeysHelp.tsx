import { useState } from 'react';
import { Button } from '../ui/Button.tsx';
import { Dialog, DialogActions } from '../ui/Dialog.tsx';
import { ROW_KEYS, SHEET_KEYS, useKeys } from '../ui/keys.ts';

/** `?` lists the keys. */
export function KeysHelp() {
  const [open, setOpen] = useState(false);
  useKeys((key) => {
    if (key !== '?') return false;
    setOpen(true);
    return true;
  });
  return (
    <Dialog open={open} title="Keys" onClose={() => setOpen(false)}>
      <dl className="facts facts-text">
        {[...ROW_KEYS, ...SHEET_KEYS].map((binding) => (
          <div key={binding.key}>
            <dt>
              <kbd className="key">{binding.key}</kbd>
            </dt>
            <dd>{binding.does}</dd>
          </div>
        ))}
      </dl>
      <DialogActions>
        <Button onClick={() => setOpen(false)}>Close</Button>
      </DialogActions>
    </Dialog>
  );
}
