export const THEME_KEY = 'fallbright.theme';
/** Hours by the device's clock between which it is night, where the clock decides. */
export const NIGHT = { from: 20, to: 7 };

/** Runs before anything is drawn, so that a dark cellar is never lit up for a moment. */
export const THEME_SCRIPT = `(function(){try{var c=localStorage.getItem('${THEME_KEY}'),h=new Date().getHours();document.documentElement.dataset.theme=c==='night'||(c==='clock'&&(h>=${NIGHT.from}||h<${NIGHT.to}))?'night':'day'}catch(e){document.documentElement.dataset.theme='day'}})()`;
