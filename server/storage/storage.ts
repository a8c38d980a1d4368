/** Pictures by content: the key of a picture is the SHA-256 of its bytes, in hexadecimal. */
export interface PictureStorage {
  /** Stores the bytes durably and answers their key; storing the same bytes again changes nothing. */
  put(bytes: Uint8Array): Promise<string>;
  /** The bytes, or undefined when the key is not stored. Throws when what is stored no longer has its hash. */
  find(key: string): Promise<Uint8Array | undefined>;
}
