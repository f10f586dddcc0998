import type { Doors } from '@/components/sensors/ConnectLines';
import { env } from '@/lib/config/env';

/** Where sensors reach this house: the embedded broker beside the web address, or the broker it was given. */
export function doors(): Doors {
  const { PUBLIC_URL, MQTT_PORT, MQTT_URL } = env();
  const broker = MQTT_URL === undefined ? null : new URL(MQTT_URL);
  return {
    mqttHost: broker?.hostname ?? new URL(PUBLIC_URL).hostname,
    mqttPort: broker ? Number(broker.port || (broker.protocol === 'mqtts:' ? 8883 : 1883)) : MQTT_PORT,
    httpUrl: PUBLIC_URL,
  };
}
