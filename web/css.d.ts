/** Style sheets are bundled by Vite; importing one has no value. */
declare module '*.css';
