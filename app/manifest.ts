import type { MetadataRoute } from 'next';

/** What the phone needs to put the field on its home screen. */
export default function manifest(): MetadataRoute.Manifest {
  return {
    id: '/field',
    name: 'Lammas field book',
    short_name: 'Lammas',
    description: 'Plots, trees and their second looks, with or without a signal.',
    start_url: '/field',
    scope: '/field',
    display: 'standalone',
    orientation: 'any',
    background_color: '#f8f4e8',
    theme_color: '#f8f4e8',
    icons: [
      { src: '/icons/lammas-192.png', sizes: '192x192', type: 'image/png' },
      { src: '/icons/lammas-512.png', sizes: '512x512', type: 'image/png' },
      { src: '/icons/lammas-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
    ],
  };
}
