import { FiguredWords } from '../../ui/FiguredWords';
import { FloorProblems } from '../FloorFigures';
import { CheckList } from '../set-out/CheckList';
import { CourseFields } from '../set-out/CourseFields';
import { DatumFields } from '../set-out/DatumFields';
import { PointCard } from '../set-out/PointCard';
import { PointTable } from '../set-out/PointTable';
import { useShownFloor } from '../table-context';

/** How the floor is put on the ground: corners to tape from, points, courses and checks. */
export function SetOutPanel() {
  const { setOut, document } = useShownFloor();
  if (!setOut) return <FloorProblems />;
  return (
    <div className="space-y-6">
      <DatumFields setOut={setOut} />
      <PointCard setOut={setOut} />
      <section aria-label="What to know">
        <h2 className="mb-2 border-b border-graphite pb-1 text-base">What to know</h2>
        <ul className="space-y-1.5 border-l-2 border-stone-300 pl-3 text-[0.95rem]">
          {setOut.advice.map(({ text, kind }, n) => (
            <li key={n} className={kind === 'floor' ? 'font-semibold' : undefined}>
              <FiguredWords words={text} display={document.display} />
            </li>
          ))}
        </ul>
      </section>
      <CourseFields setOut={setOut} />
      <PointTable setOut={setOut} />
      <CheckList setOut={setOut} />
      <p className="border-t border-stone-300 pt-3 text-sm text-slate">
        Pegs and stakes go into the ground. Have pipes and cables located before you drive one, as
        your country’s rules ask, and dig by hand near them. An issued version prints all this as
        sheets for the crew.
      </p>
    </div>
  );
}
