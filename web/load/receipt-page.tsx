import { api } from '../api';
import { Shown, useAsked } from '../asked';
import { Sheet } from '../sheet';
import { Receipt } from './receipt';

export function ReceiptPage({ load }: { load: number }) {
  const asked = useAsked(String(load), () => api.receipt(load));
  return (
    <Sheet title={asked.state === 'here' ? asked.value.file : `Receipt ${load}`}>
      <Shown asked={asked}>{(receipt) => <Receipt receipt={receipt} />}</Shown>
    </Sheet>
  );
}
