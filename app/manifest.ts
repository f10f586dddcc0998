import type { MetadataRoute } from 'next';

/** The installed app. Its icons are drawn by `scripts/icons.ts`. */
export default function manifest(): MetadataRoute.Manifest {
  return {
    id: '/',
    name: 'Fallbright',
    short_name: 'Fallbright',
    description: 'The watch kept over small fermentations until they fall bright.',
    lang: 'en',
    start_url: '/shelf',
    scope: '/',
    display: 'standalone',
    background_color: '#F1F5ED',
    theme_color: '#F1F5ED',
    categories: ['food', 'utilities'],
    icons: [
      { src: '/icon-192.png', sizes: '192x192', type: 'image/png' },
      { src: '/icon-512.png', sizes: '512x512', type: 'image/png' },
      { src: '/icon-maskable-192.png', sizes: '192x192', type: 'image/png', purpose: 'maskable' },
      { src: '/icon-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
      { src: '/icon.svg', sizes: 'any', type: 'image/svg+xml' },
    ],
    shortcuts: [
      { name: 'Rounds', url: '/rounds', icons: [{ src: '/icon-192.png', sizes: '192x192' }] },
      { name: 'Alerts', url: '/alerts', icons: [{ src: '/icon-192.png', sizes: '192x192' }] },
    ],
  };
}
