import type { Metadata } from 'next';
import { SensorList } from '@/components/sensors/SensorList';

export const metadata: Metadata = { title: 'Sensors' };

export default function SensorsPage() {
  return <SensorList />;
}
