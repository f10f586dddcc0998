import type { Metadata } from 'next';
import { SensorPage } from '@/components/sensors/SensorPage';
import { doors } from '../doors';

export const metadata: Metadata = { title: 'Sensor' };

export default async function OneSensorPage({ params }: { params: Promise<{ id: string }> }) {
  return <SensorPage id={(await params).id} doors={doors()} />;
}
