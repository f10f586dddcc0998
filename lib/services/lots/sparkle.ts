/** Gas from which drink is called sparkling, and lightly so, volumes: half way between what is usual for each. Our own rule. */
export const SPARKLING_FROM = 2.4;
export const LIGHT_FROM = 1.4;
