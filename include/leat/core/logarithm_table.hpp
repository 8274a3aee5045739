// Reciprocals with their logarithms, for core/logarithm.hpp.
//
// Written by tests/reference/make_math_tables.py: do not edit.

#ifndef LEAT_CORE_LOGARITHM_TABLE_HPP
#define LEAT_CORE_LOGARITHM_TABLE_HPP

#include <cstdint>

namespace leat::detail {

inline constexpr std::uint64_t log_first = 0x3fe6700000000000; // the bits of 0.701171875
inline constexpr double log_two_high = 0x1.62e42fefa38p-1;     // ln 2 in a multiple of 2^-42
inline constexpr double log_two_low = 0x1.ef35793c7673p-45;    // and the rest of it

/// (ln(1 + r) - r + r^2/2) / r^3 for |r| <= 0.003937, lowest degree first.
inline constexpr double log_polynomial[6] = {
    0x1.5555555555556p-2, -0x1p-2,
    0x1.99999999158cfp-3, -0x1.55555554de7d2p-3,
    0x1.2493a3d5d667ep-3, -0x1.00013805f5e9p-3,
};

/// A short number near the reciprocal of an interval's middle, and minus its logarithm: `high` is a
/// multiple of 2^-42, `low` the rest.
struct logarithm_entry {
    double reciprocal;
    double high;
    double low;
};

inline constexpr logarithm_entry logarithm_table[128] = {
    {0x1.6c1p0, -0x1.689983bca6p-2, -0x1.25a53e0c9f034p-46},
    {0x1.6a1p0, -0x1.62f570a539p-2, 0x1.5538453b676bap-44},
    {0x1.681p0, -0x1.5d495dcacdp-2, -0x1.bc3fdaed5844cp-44},
    {0x1.662p0, -0x1.57c2f53b05p-2, -0x1.0494c017c2a52p-45},
    {0x1.643p0, -0x1.5234e0670ap-2, -0x1.49483d21b40d9p-44},
    {0x1.624p0, -0x1.4c9f09e153p-2, 0x1.e1dde70e02dep-45},
    {0x1.606p0, -0x1.472fdbe4fdp-2, -0x1.f9364c53f821fp-45},
    {0x1.5e7p0, -0x1.418a821a4cp-2, -0x1.544a950cdfe5p-45},
    {0x1.5cap0, -0x1.3c3b2736b4p-2, 0x1.3e5d1e9d3ddf9p-47},
    {0x1.5acp0, -0x1.36b5776bc1p-2, -0x1.169785a9c223fp-46},
    {0x1.58fp0, -0x1.31579e142ep-2, 0x1.27cda5a6d3d1fp-45},
    {0x1.572p0, -0x1.2bf287cc41p-2, -0x1.b0f4f549d8ecfp-45},
    {0x1.555p0, -0x1.268620f34dp-2, -0x1.8f44b998bb50ep-44},
    {0x1.539p0, -0x1.214296d08ap-2, 0x1.cb6298064becap-44},
    {0x1.51dp0, -0x1.1bf816355fp-2, 0x1.1b10958a02186p-44},
    {0x1.501p0, -0x1.16a68c9dbdp-2, -0x1.b546cd487dbdep-44},
    {0x1.4e6p0, -0x1.117ee81dfep-2, -0x1.30f778a2e8cbdp-44},
    {0x1.4cbp0, -0x1.0c50965e74p-2, -0x1.91647f8ab8825p-44},
    {0x1.4bp0, -0x1.071b85fcd6p-2, 0x1.bcb8ba3e01a11p-44},
    {0x1.495p0, -0x1.01dfa5529ap-2, -0x1.2d95d56371332p-44},
    {0x1.47bp0, -0x1.f99dc6c23cp-3, 0x1.7ed06117b4369p-44},
    {0x1.461p0, -0x1.ef6f5e338cp-3, -0x1.59e36e1b431a7p-46},
    {0x1.447p0, -0x1.e533effde2p-3, 0x1.fd75bb2837bb6p-44},
    {0x1.42dp0, -0x1.daeb5aa6c4p-3, 0x1.8bfe9b3f43035p-44},
    {0x1.414p0, -0x1.d0fb7f2256p-3, 0x1.af52b20633b29p-47},
    {0x1.3fbp0, -0x1.c6ff3c6efcp-3, -0x1.ee1337e5107eep-44},
    {0x1.3e2p0, -0x1.bcf6736f7ep-3, 0x1.271e894f591e4p-44},
    {0x1.3cap0, -0x1.b34885022ep-3, -0x1.03ba859924374p-44},
    {0x1.3b1p0, -0x1.a926d3a4aep-3, 0x1.53935e85baac8p-44},
    {0x1.399p0, -0x1.9f60c06846p-3, 0x1.4355507c16436p-44},
    {0x1.381p0, -0x1.958eadae6p-3, 0x1.3b6857bb1fa3bp-46},
    {0x1.36ap0, -0x1.8c19fe2982p-3, -0x1.5e01e0d7c912bp-49},
    {0x1.352p0, -0x1.8230164c1ap-3, -0x1.98dd68a5d0b48p-46},
    {0x1.33bp0, -0x1.78a4584cp-3, -0x1.9e3f57d3f542ep-44},
    {0x1.324p0, -0x1.6f0d28ae56p-3, -0x1.69737c93373dap-44},
    {0x1.30dp0, -0x1.656a6be1dep-3, 0x1.a4d0df2ddfbcep-44},
    {0x1.2f7p0, -0x1.5c28060c46p-3, -0x1.6ece374e0e858p-44},
    {0x1.2ep0, -0x1.526e5e3a1cp-3, 0x1.790ba37fc5238p-44},
    {0x1.2cap0, -0x1.4915d832fcp-3, 0x1.53cee006bcf62p-44},
    {0x1.2b4p0, -0x1.3fb25a5952p-3, -0x1.195be6b358ff7p-44},
    {0x1.29ep0, -0x1.3643cad058p-3, -0x1.1e18f2132dfd5p-44},
    {0x1.289p0, -0x1.2d38907e04p-3, -0x1.d2f4722be431cp-44},
    {0x1.273p0, -0x1.23b412580cp-3, 0x1.7e6e809e4f37dp-44},
    {0x1.25ep0, -0x1.1a93b7d43p-3, 0x1.3debbf4ec55f3p-44},
    {0x1.249p0, -0x1.1168e8127ep-3, -0x1.93436f195cb75p-46},
    {0x1.234p0, -0x1.08338affa2p-3, -0x1.0533cac823e27p-44},
    {0x1.22p0, -0x1.fec9131dcp-4, 0x1.54555d1ae6607p-44},
    {0x1.20bp0, -0x1.ec3497b498p-4, 0x1.9ce038385817p-47},
    {0x1.1f7p0, -0x1.da6e7637c4p-4, -0x1.a83eac951c1aap-46},
    {0x1.1e3p0, -0x1.c8948014bcp-4, -0x1.6d371637a76fbp-45},
    {0x1.1cfp0, -0x1.b6a688d9b4p-4, -0x1.b175ff3be2566p-44},
    {0x1.1bbp0, -0x1.a4a4637ed4p-4, 0x1.c42890c539de5p-44},
    {0x1.1a8p0, -0x1.9375e55594p-4, -0x1.eddc37380c364p-44},
    {0x1.194p0, -0x1.814be23f8cp-4, -0x1.b2381da82fdfdp-51},
    {0x1.181p0, -0x1.6ff7309f8cp-4, -0x1.8f19994f375abp-55},
    {0x1.16ep0, -0x1.5e8fa4d858p-4, -0x1.1c6fce08d711p-44},
    {0x1.15bp0, -0x1.4d1515b988p-4, 0x1.8e7d02e3f5e95p-47},
    {0x1.148p0, -0x1.3b87598b1cp-4, 0x1.2241594aca313p-45},
    {0x1.136p0, -0x1.2ad449eff4p-4, 0x1.cea3ae5f05b87p-44},
    {0x1.123p0, -0x1.1920bc3d1cp-4, 0x1.9221e62a516ap-44},
    {0x1.111p0, -0x1.08498b51e4p-4, 0x1.93b33c55fb24fp-46},
    {0x1.0ffp0, -0x1.eec11bf258p-5, -0x1.c84280496bda5p-44},
    {0x1.0edp0, -0x1.cccb3cd798p-5, -0x1.97a98b99b5035p-44},
    {0x1.0dbp0, -0x1.aab12cd3ap-5, -0x1.84590fd8b3b42p-46},
    {0x1.0c9p0, -0x1.88729e70fp-5, 0x1.9c8d8f692991dp-45},
    {0x1.0b8p0, -0x1.67f94f0948p-5, -0x1.ecc1f3e7e4ed7p-44},
    {0x1.0a7p0, -0x1.475ee9a0bp-5, -0x1.6de8fbaa8b77ap-46},
    {0x1.095p0, -0x1.24b532104p-5, 0x1.966b2dce75097p-46},
    {0x1.084p0, -0x1.03d5d85e7p-5, -0x1.f778960ed29cfp-44},
    {0x1.073p0, -0x1.c5a92e163p-6, 0x1.962e95bcf75e5p-44},
    {0x1.062p0, -0x1.83624fba8p-6, -0x1.deb9c96b40046p-45},
    {0x1.052p0, -0x1.44c28d451p-6, -0x1.98b0a50467942p-44},
    {0x1.041p0, -0x1.01f565873p-6, -0x1.6107d26f92eb5p-44},
    {0x1.031p0, -0x1.85ac7e9e8p-7, 0x1.248883197ad1cp-47},
    {0x1.02p0, -0x1.fe02a6b1p-8, -0x1.9e23f0dda40e4p-46},
    {0x1.01p0, -0x1.ff00aa2bp-9, -0x1.0bc04a086b56ap-45},
    {0x1p0, 0.0, 0.0},
    {0x1.fcp-1, 0x1.010157588p-7, 0x1.bce251998b506p-44},
    {0x1.f82p-1, 0x1.fbea8b13cp-7, 0x1.ec927b17e4e13p-50},
    {0x1.f44p-1, 0x1.7c61b1cf6p-6, -0x1.08fc8f849a447p-45},
    {0x1.f08p-1, 0x1.f7a9b1678p-6, 0x1.42ad9271be7d7p-45},
    {0x1.eccp-1, 0x1.39f07ba0e8p-5, 0x1.eb129d642e577p-44},
    {0x1.e92p-1, 0x1.766d923c2p-5, 0x1.ff0a82f1c24c1p-46},
    {0x1.e58p-1, 0x1.b35dd9b588p-5, 0x1.d5674d6cf558ep-44},
    {0x1.e1ep-1, 0x1.f0c30c1118p-5, -0x1.caef3588b7d8p-45},
    {0x1.de6p-1, 0x1.163d6ef958p-4, -0x1.7f3b038d8e6ebp-46},
    {0x1.daep-1, 0x1.345179b63cp-4, 0x1.d4203d36150dp-44},
    {0x1.d78p-1, 0x1.518874226p-4, 0x1.30a1d96258b3ep-44},
    {0x1.d42p-1, 0x1.6ef528c058p-4, -0x1.5d462d767cadep-44},
    {0x1.d0cp-1, 0x1.8c985e9bap-4, -0x1.37c377e430036p-44},
    {0x1.cd8p-1, 0x1.a956d3ecacp-4, 0x1.e63794c02c4afp-44},
    {0x1.ca4p-1, 0x1.c6494a2e4p-4, 0x1.8a5e8ab20c4e6p-44},
    {0x1.c72p-1, 0x1.e2507702bp-4, -0x1.f897980522249p-45},
    {0x1.c4p-1, 0x1.fe89139dbcp-4, 0x1.56594d82f7a82p-44},
    {0x1.c0ep-1, 0x1.0d79e7cd48p-3, 0x1.cb422847849e4p-44},
    {0x1.bdep-1, 0x1.1b35ae3b82p-3, -0x1.20a2e76016a9dp-46},
    {0x1.bacp-1, 0x1.299d30c606p-3, 0x1.d4d0079dc08d9p-44},
    {0x1.b7ep-1, 0x1.36f4c27578p-3, -0x1.4d9e2683a54edp-44},
    {0x1.b4ep-1, 0x1.44f8b726f8p-3, 0x1.df6a4432b9bb4p-44},
    {0x1.b2p-1, 0x1.527e5e4a1cp-3, -0x1.4e60b8d4b411dp-44},
    {0x1.af2p-1, 0x1.601b076e7ap-3, 0x1.152d7d4dfc8e5p-44},
    {0x1.ac6p-1, 0x1.6d35fee52cp-3, -0x1.f127eb4f64e1fp-45},
    {0x1.a98p-1, 0x1.7b00916516p-3, -0x1.ae75fcb067e57p-44},
    {0x1.a6ep-1, 0x1.87ad07c494p-3, -0x1.70f53c386330ap-44},
    {0x1.a42p-1, 0x1.9509aa0044p-3, 0x1.f1e675b4d35c6p-44},
    {0x1.a16p-1, 0x1.a27cc3064p-3, 0x1.d954963274bb8p-44},
    {0x1.9ecp-1, 0x1.af6895610ep-3, -0x1.148288bf7a937p-45},
    {0x1.9c2p-1, 0x1.bc69684aeep-3, 0x1.8f6d5d141f9bdp-45},
    {0x1.99ap-1, 0x1.c8df7cb9a8p-3, 0x1.eee42f58e1e6ep-44},
    {0x1.97p-1, 0x1.d60a17f904p-3, -0x1.5d6e06fc20d39p-44},
    {0x1.948p-1, 0x1.e2a877a6b2p-3, 0x1.823817787081ap-44},
    {0x1.92p-1, 0x1.ef5ade4ddp-3, -0x1.a211565bb8e11p-51},
    {0x1.8fap-1, 0x1.fb7d86eee4p-3, -0x1.1c061cdb8097bp-45},
    {0x1.8d4p-1, 0x1.03d95a1d67p-2, 0x1.a17880f236109p-44},
    {0x1.8acp-1, 0x1.0a504e97bbp-2, 0x1.03094e6690c44p-44},
    {0x1.886p-1, 0x1.107e404ab1p-2, -0x1.fb921823aafdap-48},
    {0x1.862p-1, 0x1.1661caecbap-2, -0x1.171fff9fc4abbp-44},
    {0x1.83cp-1, 0x1.1ca28c64bbp-2, -0x1.ac4f842f5566bp-46},
    {0x1.818p-1, 0x1.22981fbef8p-2, -0x1.a1421609580dap-44},
    {0x1.7f4p-1, 0x1.2896a13e08p-2, 0x1.a8ed027e16952p-44},
    {0x1.7dp-1, 0x1.2e9e2bce12p-2, 0x1.4300c128d1dc2p-45},
    {0x1.7aep-1, 0x1.34585a594cp-2, -0x1.d4d9bf230f411p-44},
    {0x1.78ap-1, 0x1.3a71c56bb5p-2, -0x1.ce772094aef7p-44},
    {0x1.768p-1, 0x1.403d086ceap-2, 0x1.e6ef574487308p-44},
    {0x1.746p-1, 0x1.4610bc29c6p-2, -0x1.e82c9f310c8e6p-46},
    {0x1.724p-1, 0x1.4becf95d98p-2, -0x1.bb33b20023a7p-44},
    {0x1.702p-1, 0x1.51d1d93104p-2, 0x1.5b0faa20d9c8ep-44},
    {0x1.6e2p-1, 0x1.5765f1749ep-2, -0x1.6532d93e0d82bp-44},
};

} // namespace leat::detail

#endif
