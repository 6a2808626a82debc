/** The only place where angles change their unit. Inside the geometry angles are radians. */
export const RAD_PER_DEG = Math.PI / 180;
export const DEG_PER_RAD = 180 / Math.PI;
export const ARCSEC_PER_DEG = 3600;
export const ARCSEC_PER_RAD = (180 * 3600) / Math.PI;
export const RAD_PER_ARCSEC = Math.PI / (180 * 3600);
