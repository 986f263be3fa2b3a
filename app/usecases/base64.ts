/** Bytes as base64, for a wire that carries text; written out because the pure layers know no platform. */
const SIGNS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/'
const STRIDE = 3 * 4096

export function toBase64(bytes: Uint8Array): string {
  const parts: string[] = []
  for (let start = 0; start < bytes.length; start += STRIDE) {
    let part = ''
    for (let i = start; i < Math.min(start + STRIDE, bytes.length); i += 3) {
      const left = bytes.length - i
      const word = (bytes[i]! << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0)
      part += SIGNS[word >> 18]! + SIGNS[(word >> 12) & 63]!
      part += (left > 1 ? SIGNS[(word >> 6) & 63]! : '=') + (left > 2 ? SIGNS[word & 63]! : '=')
    }
    parts.push(part)
  }
  return parts.join('')
}
