#include "zeotrope/data/catalogue.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cstdlib>
#include <map>
#include <mutex>
#include <set>

#include "zeotrope/data/names.hpp"
#include "zeotrope/data/reader.hpp"
#include "zeotrope/error.hpp"

namespace zeotrope::data {

namespace fs = std::filesystem;

namespace {

/// "R-32 or R-125" and the like at the end of a message.
std::string did_you_mean(const std::vector<std::string>& names) {
  if (names.empty()) return "";
  std::string s = "; near to it are: ";
  for (std::size_t i = 0; i < names.size(); ++i) {
    s += i == 0 ? "" : ", ";
    s += names[i];
  }
  return s;
}

}  // namespace

struct Catalogue::Shelf {
  std::vector<fs::path> folders;

  std::mutex lock;  // guards all below
  std::optional<std::map<std::string, fs::path>> files;  // name key of the file's stem -> file; first folder wins
  std::map<fs::path, std::shared_ptr<const Compound>> compounds;
  std::optional<std::map<std::string, std::set<fs::path>>> aliases;  // names, aliases, formulas, CAS numbers -> files
  std::optional<std::map<std::string, std::shared_ptr<const Blend>>> blend_by_key;
  std::vector<std::shared_ptr<const Blend>> blend_list;
  std::optional<std::map<std::pair<std::string, std::string>, Pair>> pairs;
  Estimation estimation;
  std::optional<std::map<std::string, std::shared_ptr<const Departure>>> departures;
  std::optional<std::vector<Caution>> cautions;

  const std::map<std::string, fs::path>& file_index() {
    if (files) return *files;
    std::map<std::string, fs::path> index;
    for (const auto& folder : folders) {
      const auto place = folder / "compounds";
      if (!fs::is_directory(place)) continue;
      std::vector<fs::path> found;
      for (const auto& entry : fs::directory_iterator(place))
        if (entry.path().extension() == ".toml") found.push_back(entry.path());
      std::sort(found.begin(), found.end());
      // in a user's folder a file may have any name: the designation inside counts too
      if (folder != folders.back())
        for (const auto& f : found) index.emplace(name_key(load(f)->designation), f);
      for (const auto& f : found) index.emplace(name_key(f.stem().string()), f);
    }
    return files.emplace(std::move(index));
  }

  std::shared_ptr<const Compound> load(const fs::path& file) {
    auto& slot = compounds[file];
    if (!slot) slot = std::make_shared<const Compound>(read_compound(file));
    return slot;
  }

  const std::map<std::string, std::set<fs::path>>& alias_index() {
    if (aliases) return *aliases;
    std::map<std::string, std::set<fs::path>> index;
    for (const auto& [key, file] : file_index()) {
      const auto c = load(file);
      for (const auto& name : {c->designation, c->chemical_name, c->formula, c->cas})
        if (!name_key(name).empty()) index[name_key(name)].insert(file);
      for (const auto& name : c->aliases) index[name_key(name)].insert(file);
    }
    return aliases.emplace(std::move(index));
  }

  void need_blends() {
    if (blend_by_key) return;
    std::map<std::string, std::shared_ptr<const Blend>> index;
    std::vector<std::shared_ptr<const Blend>> list;
    for (const auto& folder : folders)
      if (const auto f = folder / "blends.toml"; fs::exists(f))
        for (auto& b : read_blends(f)) {
          const auto shared = std::make_shared<const Blend>(std::move(b));
          if (index.emplace(name_key(shared->designation), shared).second) list.push_back(shared);
        }
    blend_list = std::move(list);
    blend_by_key = std::move(index);
  }

  void need_pairs() {
    if (pairs) return;
    std::map<std::pair<std::string, std::string>, Pair> index;
    bool estimated = false;
    for (const auto& folder : folders)
      if (const auto f = folder / "pairs.toml"; fs::exists(f)) {
        auto file = read_pairs(f);
        for (auto& p : file.pairs) {
          auto key = std::make_pair(name_key(p.first), name_key(p.second));
          auto turned = std::make_pair(key.second, key.first);
          if (index.contains(key) || index.contains(turned)) continue;
          index.emplace(std::move(key), std::move(p));
        }
        if (!estimated && !file.estimation.gamma_v_rule.empty()) {
          estimation = std::move(file.estimation);
          estimated = true;
        }
      }
    pairs = std::move(index);
  }
};

Catalogue::Catalogue(std::vector<fs::path> folders) : shelf_(std::make_shared<Shelf>()) {
  for (const auto& f : folders)
    if (!fs::is_directory(f)) throw BadInput(fmt::format("coefficient folder {}: there is no such folder", f.string()));
  shelf_->folders = std::move(folders);
  for (auto& f : standard_folders()) shelf_->folders.push_back(std::move(f));
  if (shelf_->folders.empty())
    throw BadInput("no coefficient files: neither a folder was given, nor is ZEOTROPE_FLUIDS set, nor is the installed folder there");
}

std::vector<fs::path> Catalogue::standard_folders() {
  std::vector<fs::path> r;
  if (const char* variable = std::getenv("ZEOTROPE_FLUIDS")) {
    const std::string_view text = variable;
    for (std::size_t at = 0; at <= text.size();) {
      const auto end = std::min(text.find(':', at), text.size());
      if (end > at) {
        fs::path f(text.substr(at, end - at));
        if (!fs::is_directory(f)) throw BadInput(fmt::format("ZEOTROPE_FLUIDS: {} is not a folder", f.string()));
        r.push_back(std::move(f));
      }
      at = end + 1;
    }
  }
  for (const auto* f : {ZEOTROPE_INSTALLED_FLUIDS, ZEOTROPE_SOURCE_FLUIDS})
    if (*f != '\0' && fs::is_directory(f)) {
      r.emplace_back(f);
      break;
    }
  return r;
}

const std::vector<fs::path>& Catalogue::folders() const { return shelf_->folders; }

std::shared_ptr<const Compound> Catalogue::find_compound(std::string_view name) const {
  // a name, never a path
  if (name.find_first_of("/\\") != std::string_view::npos) return nullptr;
  const auto key = name_key(name);
  if (key.empty()) return nullptr;
  const std::scoped_lock guard(shelf_->lock);
  const auto& files = shelf_->file_index();
  if (const auto it = files.find(key); it != files.end()) return shelf_->load(it->second);
  const auto& aliases = shelf_->alias_index();
  const auto it = aliases.find(key);
  if (it == aliases.end()) return nullptr;
  if (it->second.size() > 1) {
    std::string which;
    for (const auto& f : it->second) which += fmt::format("{}{}", which.empty() ? "" : ", ", shelf_->load(f)->designation);
    throw BadInput(fmt::format("\"{}\" fits several compounds: {}; one of these is wanted", name.substr(0, 64), which));
  }
  return shelf_->load(*it->second.begin());
}

std::shared_ptr<const Compound> Catalogue::compound(std::string_view name) const {
  if (auto c = find_compound(name)) return c;
  if (const auto b = find_blend(name)) throw BadInput(fmt::format("{} is a blend; its components are wanted", b->designation));
  throw BadInput(fmt::format("no compound \"{}\" in the coefficient files{}", name.substr(0, 64), did_you_mean(suggestions(name))));
}

std::shared_ptr<const Blend> Catalogue::find_blend(std::string_view designation) const {
  if (designation.find_first_of("/\\") != std::string_view::npos) return nullptr;
  const std::scoped_lock guard(shelf_->lock);
  shelf_->need_blends();
  const auto it = shelf_->blend_by_key->find(name_key(designation));
  return it == shelf_->blend_by_key->end() ? nullptr : it->second;
}

std::optional<Pair> Catalogue::find_pair(std::string_view first, std::string_view second) const {
  const std::scoped_lock guard(shelf_->lock);
  shelf_->need_pairs();
  auto a = name_key(first), b = name_key(second);
  if (const auto it = shelf_->pairs->find({a, b}); it != shelf_->pairs->end()) return it->second;
  if (const auto it = shelf_->pairs->find({b, a}); it != shelf_->pairs->end()) {
    Pair p = it->second;
    std::swap(p.first, p.second);
    p.beta_T = 1 / p.beta_T;
    p.beta_v = 1 / p.beta_v;
    return p;
  }
  return std::nullopt;
}

std::shared_ptr<const Departure> Catalogue::find_departure(std::string_view name) const {
  const std::scoped_lock guard(shelf_->lock);
  if (!shelf_->departures) {
    std::map<std::string, std::shared_ptr<const Departure>> index;
    for (const auto& folder : shelf_->folders)
      if (const auto f = folder / "departures.toml"; fs::exists(f))
        for (auto& d : read_departures(f)) {
          auto key = d.name;
          index.emplace(std::move(key), std::make_shared<const Departure>(std::move(d)));
        }
    shelf_->departures = std::move(index);
  }
  const auto it = shelf_->departures->find(std::string(name));
  return it == shelf_->departures->end() ? nullptr : it->second;
}

const Estimation& Catalogue::estimation() const {
  const std::scoped_lock guard(shelf_->lock);
  shelf_->need_pairs();
  return shelf_->estimation;
}

const std::vector<Caution>& Catalogue::cautions() const {
  const std::scoped_lock guard(shelf_->lock);
  if (!shelf_->cautions) {
    std::vector<Caution> all;
    for (const auto& folder : shelf_->folders)
      if (const auto f = folder / "cautions.toml"; fs::exists(f)) {
        all = read_cautions(f);
        break;
      }
    shelf_->cautions = std::move(all);
  }
  return *shelf_->cautions;
}

std::vector<std::string> Catalogue::compound_designations() const {
  const std::scoped_lock guard(shelf_->lock);
  std::vector<std::string> r;
  for (const auto& [key, file] : shelf_->file_index()) r.push_back(shelf_->load(file)->designation);
  return r;
}

std::vector<std::shared_ptr<const Blend>> Catalogue::blends() const {
  const std::scoped_lock guard(shelf_->lock);
  shelf_->need_blends();
  return shelf_->blend_list;
}

std::vector<std::string> Catalogue::suggestions(std::string_view name) const {
  std::vector<std::string> known = compound_designations();
  {
    const std::scoped_lock guard(shelf_->lock);
    shelf_->need_blends();
    for (const auto& b : shelf_->blend_list) known.push_back(b->designation);
    for (const auto& [key, file] : shelf_->file_index()) {
      const auto c = shelf_->load(file);
      if (c->chemical_name != c->designation) known.push_back(c->chemical_name);
    }
  }
  return nearest_names(name, known);
}

}  // namespace zeotrope::data
