import type { Server } from 'node:http';
import { controlServer } from '../shared/control';
import { readJson } from '../shared/json-http';
import { mailFault } from './faults';
import type { SmtpService } from './smtp';

/** The control port: faults to come and what happened in SMTP sessions. */
export function mailControl({ faults, log }: SmtpService): Server {
  return controlServer({
    'POST /faults': async (request) => {
      const fault = await readJson(request, mailFault);
      faults.add(fault);
      return { added: fault };
    },
    'GET /faults': () => ({ faults: faults.list() }),
    'DELETE /faults': () => ({ removed: faults.clear() }),
    'GET /requests': () => ({ requests: log.list() }),
    'DELETE /requests': () => ({ removed: log.clear() }),
  });
}
