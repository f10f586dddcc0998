/** MQTT topics. A sensor's identifier is its MQTT user name. */
const PREFIX = 'fallbright/v1';

export const readingsTopic = (sensor: string) => `${PREFIX}/${sensor}/readings`;
export const settingsTopic = (sensor: string) => `${PREFIX}/${sensor}/settings`;
/** What a subscriber at an outside broker listens to. */
export const ALL_READINGS = `${PREFIX}/+/readings`;

const SENSOR = /^[a-z0-9-]{4,64}$/;
export const isSensorIdentifier = (value: string) => SENSOR.test(value);

/** The sensor a readings topic belongs to, or null for any other topic. */
export function sensorOfTopic(topic: string): string | null {
  const match = /^fallbright\/v1\/([^/]+)\/readings$/.exec(topic);
  return match?.[1] && isSensorIdentifier(match[1]) ? match[1] : null;
}
