#include "bench/campaign/campaign.hpp"

#include <poll.h>

#include <algorithm>
#include <cerrno>
#include <map>
#include <memory>
#include <vector>

#include "bench/campaign/worker.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace {

/// Hands out units, holds results that came early, merges in order.
class Campaign {
 public:
  Campaign(const CampaignPlan& plan, const CampaignOptions& options) : plan_(plan), options_(options) {}

  CampaignEnd run() {
    for (int i = 0; i < std::max(1, options_.jobs) && i < plan_.units; ++i) {
      workers_.push_back(std::make_unique<Worker>(plan_.work));
    }
    hand_out();
    while (any_busy()) {
      collect();
      hand_out();
    }
    return merged_ == plan_.units ? CampaignEnd::Complete : CampaignEnd::Interrupted;
  }

 private:
  bool stopping() const { return options_.stop != nullptr && *options_.stop != 0; }

  bool any_busy() const {
    return std::any_of(workers_.begin(), workers_.end(), [](const auto& worker) { return worker->is_busy(); });
  }

  void hand_out() {
    for (const auto& worker : workers_) {
      recall_known();
      if (stopping() || next_ >= plan_.units) return;
      if (!worker->is_busy()) worker->start(next_++);
    }
    recall_known();
  }

  void recall_known() {
    std::string result;
    while (!stopping() && next_ < plan_.units && options_.recall && options_.recall(next_, result)) {
      take(next_++, std::move(result));
    }
  }

  void collect() {
    std::vector<pollfd> waiting;
    std::vector<Worker*> owners;
    for (const auto& worker : workers_) {
      if (!worker->is_busy()) continue;
      waiting.push_back({worker->reply_descriptor(), POLLIN, 0});
      owners.push_back(worker.get());
    }
    if (::poll(waiting.data(), waiting.size(), -1) < 0) {
      if (errno == EINTR) return;
      throw SystemFault("waiting for the worker processes failed");
    }
    for (std::size_t i = 0; i < waiting.size(); ++i) {
      if (waiting[i].revents != 0) receive(owners[i]->finish());
    }
  }

  void receive(Reply reply) {
    if (reply.kind == ReplyKind::InputFault) throw InputError(reply.place, reply.bytes);
    if (reply.kind == ReplyKind::SystemTrouble) throw SystemFault(reply.bytes);
    if (options_.keep) options_.keep(reply.unit, reply.bytes);
    take(reply.unit, std::move(reply.bytes));
  }

  void take(std::int64_t unit, std::string result) {
    early_.emplace(unit, std::move(result));
    for (auto first = early_.find(merged_); first != early_.end(); first = early_.find(merged_)) {
      plan_.merge(merged_, first->second);
      early_.erase(first);
      ++merged_;
      if (options_.advance) options_.advance(merged_, plan_.units);
    }
  }

  const CampaignPlan& plan_;
  const CampaignOptions& options_;
  std::vector<std::unique_ptr<Worker>> workers_;
  std::map<std::int64_t, std::string> early_;
  std::int64_t next_{0};
  std::int64_t merged_{0};
};

}  // namespace

CampaignEnd run_campaign(const CampaignPlan& plan, const CampaignOptions& options) {
  return Campaign(plan, options).run();
}

}  // namespace cistern
