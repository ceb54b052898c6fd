/**
 * Column types of the tables. Ids are compared byte for byte; text sorts and compares as people expect;
 * exact values are text, because the driver rounds DECIMAL and DOUBLE.
 */
export const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";
export const HASH = "CHAR(64) CHARACTER SET ascii COLLATE ascii_bin";
export const WORD = "VARCHAR(30) CHARACTER SET ascii COLLATE ascii_bin";
/** Case and accents matter: 7.3(a) is not 7.3(A). */
export const EXACT_TEXT = "CHARACTER SET utf8mb4 COLLATE utf8mb4_bin";
export const TABLE = "ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci ROW_FORMAT=DYNAMIC";
