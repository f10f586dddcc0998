import type { MetadataRoute } from 'next';

export default function manifest(): MetadataRoute.Manifest {
  return {
    name: 'Fallbright',
    short_name: 'Fallbright',
    description: 'The watch kept over small fermentations until they fall bright.',
    start_url: '/shelf',
    display: 'standalone',
    background_color: '#F1F5ED',
    theme_color: '#F1F5ED',
    icons: [{ src: '/icon.svg', sizes: 'any', type: 'image/svg+xml' }],
  };
}
