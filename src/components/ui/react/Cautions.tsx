import { CAUTIONS } from '@/components/site/cautions';

/** React twin of Cautions.astro. */
export function Cautions() {
  const last = CAUTIONS.length - 1;
  return (
    <aside className="caution">
      <h2>Before anyone touches the car</h2>
      <ul>
        {CAUTIONS.map((sentence, i) => (
          <li key={sentence} className={i === last ? 'caution-last' : undefined}>
            {sentence}
          </li>
        ))}
      </ul>
    </aside>
  );
}
