/** A term and its value in a brief. */
export const Pair = ({ term, value }: { term: string; value: string }) => (
  <div>
    <dt>{term}</dt>
    <dd>{value}</dd>
  </div>
);
