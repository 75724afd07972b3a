import { Dialog } from '../ui/Dialog';
import { KEY_LIST } from './table-keys';

export function KeyList({ open, onClose }: { open: boolean; onClose: () => void }) {
  return (
    <Dialog open={open} onClose={onClose} title="Keys" wide>
      <div className="grid gap-x-8 gap-y-5 md:grid-cols-2">
        {KEY_LIST.map(([group, keys]) => (
          <section key={group}>
            <h3 className="border-b border-graphite pb-1">{group}</h3>
            <dl className="hairlines">
              {keys.map(([key, what]) => (
                <div key={key} className="flex gap-3 py-1.5">
                  <dt className="w-28 shrink-0 font-semibold">{key}</dt>
                  <dd>{what}</dd>
                </div>
              ))}
            </dl>
          </section>
        ))}
      </div>
    </Dialog>
  );
}
