#include <gapwright/catalog/catalogs.hpp>

#include <bit>

namespace gapwright {
namespace {

constexpr std::uint64_t fnv_prime = 1099511628211ULL;

std::uint64_t mix_byte(std::uint64_t state, std::uint64_t byte) {
  return (state ^ (byte & 0xffU)) * fnv_prime;
}

// Least significant byte first on every machine.
std::uint64_t mix_word(std::uint64_t state, std::uint64_t word) {
  for (int shift = 0; shift < 64; shift += 8) state = mix_byte(state, word >> shift);
  return state;
}

}  // namespace

// Each kind of content is led by a tag, text also by its length, so that neighbours cannot merge.
ContentHash& ContentHash::add(std::string_view text) {
  state_ = mix_word(mix_byte(state_, 't'), text.size());
  for (const char c : text) state_ = mix_byte(state_, static_cast<unsigned char>(c));
  return *this;
}

ContentHash& ContentHash::add(double value) {
  state_ = mix_word(mix_byte(state_, 'd'), std::bit_cast<std::uint64_t>(value));
  return *this;
}

ContentHash& ContentHash::add(std::int64_t value) {
  state_ = mix_word(mix_byte(state_, 'i'), static_cast<std::uint64_t>(value));
  return *this;
}

std::string ContentHash::hex() const {
  constexpr char digits[] = "0123456789abcdef";
  std::string text;
  for (int shift = 60; shift >= 0; shift -= 4) text += digits[(state_ >> shift) & 0xfU];
  return text;
}

}  // namespace gapwright
