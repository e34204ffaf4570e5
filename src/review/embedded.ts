/** How the page as one file holds its data: by these it is written and found again. */

/** Id of the element with the data, as JSON. */
export const DATA_ID = "tossbake-data";
/** Class of the elements with the files, in base64; which one says FILE_NAME. */
export const FILE_CLASS = "tossbake-file";
export const FILE_NAME = "data-name";
