/** Where the theme is mirrored for the first paint; the device's store holds it too. */
export const THEME_KEY = 'lammas-theme';

/** Runs before the first paint, so that a phone in the dark never flashes white. Hashed into the page's policy at the build. */
export const themeScript = `try{if(localStorage.getItem('${THEME_KEY}')==='dusk')document.documentElement.dataset.theme='dusk'}catch{}`;
