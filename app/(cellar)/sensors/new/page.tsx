import type { Metadata } from 'next';
import { NewSensor } from '@/components/sensors/NewSensor';
import { doors } from '../doors';

export const metadata: Metadata = { title: 'Add a sensor' };

export default function NewSensorPage() {
  return <NewSensor doors={doors()} />;
}
