/** Asks the desk endpoints what fits the text. */
export type FoundCustomer = { kind: 'customer'; id: number; name: string; detail: string };
export type FoundInstrument = {
  kind: 'instrument';
  id: number;
  name: string;
  detail: string;
  maker: string;
  model: string;
  serial: string;
  customer: FoundCustomer;
};
export type Found = FoundCustomer | FoundInstrument;

type CustomerAnswer = { id: number; name: string; email: string | null; phone: string | null };
type InstrumentAnswer = {
  id: number;
  maker: string;
  model: string;
  serial: string;
  customer: { id: number; name: string };
  tickets: { number: string; receivedAt: string; symptoms: string }[];
};

async function ask<T>(path: string, q: string, signal: AbortSignal): Promise<T[]> {
  const answer = await fetch(`${path}?limit=8&q=${encodeURIComponent(q)}`, { signal });
  if (!answer.ok) throw new Error(`${path} answered ${answer.status}`);
  return ((await answer.json()) as { items: T[] }).items;
}

/** Up to eight that fit. @throws when the server does not answer. */
export async function search(
  what: 'customer' | 'instrument',
  q: string,
  signal: AbortSignal,
): Promise<Found[]> {
  if (what === 'customer')
    return (await ask<CustomerAnswer>('/api/customers', q, signal)).map((c) => ({
      kind: 'customer',
      id: c.id,
      name: c.name,
      detail: [c.email, c.phone].filter(Boolean).join(' · '),
    }));
  return (await ask<InstrumentAnswer>('/api/instruments', q, signal)).map((i) => {
    const last = i.tickets[0];
    return {
      kind: 'instrument',
      id: i.id,
      name: `${i.serial} · ${i.maker} ${i.model}`,
      detail: `${i.customer.name}${last ? ` · here ${i.tickets.length} ${i.tickets.length === 1 ? 'time' : 'times'}, last ${last.number}: ${last.symptoms}` : ''}`,
      maker: i.maker,
      model: i.model,
      serial: i.serial,
      customer: { kind: 'customer', id: i.customer.id, name: i.customer.name, detail: '' },
    };
  });
}
