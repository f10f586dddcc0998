'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import type { CreatedSensorBody, SensorBody } from '@/lib/contracts/sensors';
import { removeSensor, rotateSensor } from '@/lib/client/sensors';
import { useAct } from '@/components/ui/use-act';

/** A new secret, or the end of it: each asked twice. */
export function Credential({ sensor, onNewSecret }: { sensor: SensorBody; onNewSecret: (sensor: CreatedSensorBody) => void }) {
  const router = useRouter();
  const [asked, setAsked] = useState<'secret' | 'remove' | null>(null);
  const { busy, failed, act } = useAct();
  return (
    <div className="flex flex-col items-start gap-3 border-b px-(--margin) py-4">
      {failed && <FormError>{failed}</FormError>}
      {asked === null && (
        <div className="flex flex-wrap gap-2">
          <Button onClick={() => setAsked('secret')}>New secret</Button>
          <Button look="final" onClick={() => setAsked('remove')}>
            Remove it
          </Button>
        </div>
      )}
      {asked === 'secret' && (
        <>
          <p className="type-body">The old secret ends at once: until the new one is in the sensor, it is refused.</p>
          <div className="flex flex-wrap gap-2">
            <Button look="final" disabled={busy} onClick={() => void act(async () => onNewSecret(await rotateSensor(sensor.id)))}>
              Make a new secret
            </Button>
            <Button onClick={() => setAsked(null)}>Leave it</Button>
          </div>
        </>
      )}
      {asked === 'remove' && (
        <>
          <p className="type-body">It is refused from now on and leaves the list. What it measured stays with the batches it was in.</p>
          <div className="flex flex-wrap gap-2">
            <Button look="final" disabled={busy} onClick={() => void act(() => removeSensor(sensor.id)).then((done) => done && router.push('/sensors'))}>
              Remove {sensor.name}
            </Button>
            <Button onClick={() => setAsked(null)}>Leave it</Button>
          </div>
        </>
      )}
    </div>
  );
}
