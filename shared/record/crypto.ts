/** The public half of a P-256 key (RFC 7517), x and y in base64url. */
export interface PublicJwk {
  kty: 'EC';
  crv: 'P-256';
  x: string;
  y: string;
}

/** What the record needs of cryptography, handed in by whoever runs it: browser, worker, server or a test. */
export interface RecordCrypto {
  sha256(bytes: Uint8Array): Promise<Uint8Array>;
  /** True when `sig` (64 bytes, r then s) is an ES256 signature of `signingInput` by that key. */
  verifyEs256(publicJwk: PublicJwk, signingInput: Uint8Array, sig: Uint8Array): Promise<boolean>;
}

/** Holder of a private key: signs with ES256 (64 bytes, r then s); `kid` is the RFC 7638 thumbprint of its public half. */
export interface Signer {
  kid: string;
  sign(signingInput: Uint8Array): Promise<Uint8Array>;
}
