#include "bench/statistics/requirement.hpp"

namespace cistern {

std::string_view name_of(Verdict verdict) {
  switch (verdict) {
    case Verdict::Met: return "met";
    case Verdict::Undecided: return "undecided";
    case Verdict::NotMet: break;
  }
  return "not met";
}

Verdict judge_at_most(const Limits& one_sided, double bound) {
  if (one_sided.high <= bound) return Verdict::Met;
  return one_sided.low > bound ? Verdict::NotMet : Verdict::Undecided;
}

Verdict judge_at_least(const Limits& one_sided, double bound) {
  if (one_sided.low >= bound) return Verdict::Met;
  return one_sided.high < bound ? Verdict::NotMet : Verdict::Undecided;
}

}  // namespace cistern
