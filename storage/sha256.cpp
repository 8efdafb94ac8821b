#include "storage/sha256.h"

#include <algorithm>
#include <bit>
#include <cstddef>
#include <string_view>

namespace lostwork {
namespace {

constexpr std::size_t block_bytes = 64;

// FIPS 180-4, 4.2.2: first 32 bits of the fractional parts of the cube roots of the first 64
// primes.
constexpr auto k = std::to_array<std::uint32_t>(
    {0x428a2f98, 0x71374491, 0xb5c0fbcf, 0xe9b5dba5, 0x3956c25b, 0x59f111f1, 0x923f82a4,
     0xab1c5ed5, 0xd807aa98, 0x12835b01, 0x243185be, 0x550c7dc3, 0x72be5d74, 0x80deb1fe,
     0x9bdc06a7, 0xc19bf174, 0xe49b69c1, 0xefbe4786, 0x0fc19dc6, 0x240ca1cc, 0x2de92c6f,
     0x4a7484aa, 0x5cb0a9dc, 0x76f988da, 0x983e5152, 0xa831c66d, 0xb00327c8, 0xbf597fc7,
     0xc6e00bf3, 0xd5a79147, 0x06ca6351, 0x14292967, 0x27b70a85, 0x2e1b2138, 0x4d2c6dfc,
     0x53380d13, 0x650a7354, 0x766a0abb, 0x81c2c92e, 0x92722c85, 0xa2bfe8a1, 0xa81a664b,
     0xc24b8b70, 0xc76c51a3, 0xd192e819, 0xd6990624, 0xf40e3585, 0x106aa070, 0x19a4c116,
     0x1e376c08, 0x2748774c, 0x34b0bcb5, 0x391c0cb3, 0x4ed8aa4a, 0x5b9cca4f, 0x682e6ff3,
     0x748f82ee, 0x78a5636f, 0x84c87814, 0x8cc70208, 0x90befffa, 0xa4506ceb, 0xbef9a3f7,
     0xc67178f2});

// FIPS 180-4, 5.3.3.
constexpr std::array<std::uint32_t, 8> initial{0x6a09e667, 0xbb67ae85, 0x3c6ef372, 0xa54ff53a,
                                               0x510e527f, 0x9b05688c, 0x1f83d9ab, 0x5be0cd19};

// 6.2.2, step 1: the message schedule.
std::array<std::uint32_t, 64> schedule(std::span<const std::uint8_t, block_bytes> block) {
  std::array<std::uint32_t, 64> w{};
  for (std::size_t t = 0; t < 16; ++t) {
    for (std::size_t byte = 0; byte < 4; ++byte) {
      w[t] = (w[t] << 8U) | block[4 * t + byte];
    }
  }
  for (std::size_t t = 16; t < w.size(); ++t) {
    const std::uint32_t x = w[t - 15];
    const std::uint32_t y = w[t - 2];
    const std::uint32_t sigma0 = std::rotr(x, 7) ^ std::rotr(x, 18) ^ (x >> 3U);
    const std::uint32_t sigma1 = std::rotr(y, 17) ^ std::rotr(y, 19) ^ (y >> 10U);
    w[t] = sigma1 + w[t - 7] + sigma0 + w[t - 16];
  }
  return w;
}

// 6.2.2, steps 2 to 4.
void take(std::array<std::uint32_t, 8>& hash, std::span<const std::uint8_t, block_bytes> block) {
  const auto w = schedule(block);
  auto [a, b, c, d, e, f, g, h] = hash;
  for (std::size_t t = 0; t < w.size(); ++t) {
    const std::uint32_t sum1 = std::rotr(e, 6) ^ std::rotr(e, 11) ^ std::rotr(e, 25);
    const std::uint32_t choice = (e & f) ^ (~e & g);
    const std::uint32_t t1 = h + sum1 + choice + k[t] + w[t];
    const std::uint32_t sum0 = std::rotr(a, 2) ^ std::rotr(a, 13) ^ std::rotr(a, 22);
    const std::uint32_t majority = (a & b) ^ (a & c) ^ (b & c);
    h = g;
    g = f;
    f = e;
    e = d + t1;
    d = c;
    c = b;
    b = a;
    a = t1 + sum0 + majority;
  }
  const std::array<std::uint32_t, 8> change{a, b, c, d, e, f, g, h};
  for (std::size_t i = 0; i < hash.size(); ++i) {
    hash[i] += change[i];
  }
}

}  // namespace

Sha256 sha256(std::span<const std::uint8_t> bytes) {
  auto hash = initial;
  const std::size_t whole = bytes.size() / block_bytes * block_bytes;
  for (std::size_t at = 0; at < whole; at += block_bytes) {
    take(hash, bytes.subspan(at).first<block_bytes>());
  }
  // 5.1.1: a one bit, zeros, and the length in bits as 64 bits, big-endian.
  std::array<std::uint8_t, 2 * block_bytes> tail{};
  std::copy(bytes.begin() + static_cast<std::ptrdiff_t>(whole), bytes.end(), tail.begin());
  const std::size_t rest = bytes.size() - whole;
  tail[rest] = 0x80;
  const std::size_t tail_bytes = rest + 9 <= block_bytes ? block_bytes : 2 * block_bytes;
  const std::uint64_t bits = 8 * static_cast<std::uint64_t>(bytes.size());
  for (std::size_t i = 0; i < 8; ++i) {
    tail[tail_bytes - 1 - i] = static_cast<std::uint8_t>(bits >> (8 * i));
  }
  for (std::size_t at = 0; at < tail_bytes; at += block_bytes) {
    take(hash, std::span<const std::uint8_t>{tail}.subspan(at).first<block_bytes>());
  }
  Sha256 out{};
  for (std::size_t i = 0; i < out.size(); ++i) {
    out[i] = static_cast<std::uint8_t>(hash[i / 4] >> (24 - 8 * (i % 4)));
  }
  return out;
}

std::string hexadecimal(const Sha256& hash) {
  constexpr std::string_view digits = "0123456789abcdef";
  std::string out;
  for (const std::uint8_t byte : hash) {
    out += digits[byte >> 4U];
    out += digits[byte & 15U];
  }
  return out;
}

}  // namespace lostwork
