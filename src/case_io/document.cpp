#include <fmt/format.h>
#include <yaml-cpp/eventhandler.h>
#include <yaml-cpp/exceptions.h>
#include <yaml-cpp/parser.h>

#include <set>
#include <sstream>

#include "dutygauge/case_io.hpp"
#include "raw_text.hpp"
#include "wording.hpp"

namespace dutygauge::case_io {
namespace {

constexpr std::size_t most_nodes = 100'000;
constexpr std::size_t deepest = 32;
constexpr std::size_t longest_value = 4096;
constexpr std::size_t most_before_stop = 10;

/// A mistake that stops the reading; thrown inside this file only.
struct Stop {
  YAML::Mark at;
  std::string what, expected, remedy;
};

Stop alias_refused(const YAML::Mark& mark) {
  return {mark, "aliases (*name) are not read", "the value itself",
          "write the value out, or put quotes round a text that begins with '*'"};
}

Stop anchor_refused(const YAML::Mark& mark) {
  return {mark, "anchors (&name) are not read", "the value itself",
          "remove the anchor, or put quotes round a text that begins with '&'"};
}

/// Whether a key is a temperature with a decimal point, as in `viscosity: {37.8 degC: 4 cSt}`.
bool is_decimal_key(std::string_view path, std::string_view key) {
  return last_segment(path) == "viscosity" && first_dot(key) == std::string_view::npos;
}

/// Blocks under which a key may itself be a dotted key.
bool holds_dotted_keys(std::string_view path) {
  return path.starts_with("operating_cases.") || path == "present" || path.starts_with("present.");
}

/// Builds a Document from the parser's events and refuses what a case has no use for.
class Builder : public YAML::EventHandler {
 public:
  Builder(Document& document, const RawText& text) : document_(document), text_(text) {}

  void OnDocumentStart(const YAML::Mark& mark) override {
    if (documents_++ > 0)
      throw Stop{mark, "a second document begins here", "one document in a file",
                 "remove '---'; if there is none, put quotes round the value above that holds ' #'"};
  }
  void OnDocumentEnd() override {}

  void OnNull(const YAML::Mark& mark, YAML::anchor_t anchor) override {
    check(mark, "", anchor);
    if (open_.empty()) return;  // nothing but comments
    if (wants_key()) throw Stop{mark, "a key is empty", "a word before the colon", "write the key"};
    // The parser's mark of an empty value is that of whatever follows it.
    add_leaf("", false, Position{});
  }

  void OnAlias(const YAML::Mark& mark, YAML::anchor_t) override { throw alias_refused(mark); }

  void OnScalar(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                const std::string& value) override {
    check(mark, tag, anchor);
    if (open_.empty())
      throw Stop{mark, "the file holds a single text, no keys", "lines such as 'dutygauge: 1'",
                 "write a blank after each colon; begin from the starter case"};
    if (text_.is_open_quote(mark.line, mark.column))
      throw Stop{mark, "a quote is opened here and never closed", "a closing quote", "close it"};
    if (wants_key())
      take_key(mark, value);
    else
      add_leaf(value, tag == "!", text_.position(mark.line, mark.column));
  }

  void OnMapStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                  YAML::EmitterStyle::value) override {
    check(mark, tag, anchor);
    open_block(mark, true);
  }
  void OnMapEnd() override { open_.pop_back(); }

  void OnSequenceStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                       YAML::EmitterStyle::value) override {
    check(mark, tag, anchor);
    if (open_.empty())
      throw Stop{mark, "the file holds a list", "keys and values such as 'dutygauge: 1'",
                 "remove the leading '-' or '['"};
    open_block(mark, false);
  }
  void OnSequenceEnd() override { open_.pop_back(); }

 private:
  struct Frame {
    std::string path;
    bool is_map = true;
    bool skipped = false;  ///< under a key that is refused
    bool wants_key = true;
    bool key_refused = false;
    std::string key;
    Position key_at;
    std::set<std::string> keys;
    std::size_t items = 0;
  };

  bool wants_key() const { return open_.back().is_map && open_.back().wants_key; }

  void check(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor) {
    if (++nodes_ > most_nodes)
      throw Stop{mark, fmt::format("more than {} keys and values", most_nodes),
                 "a case of some hundred lines", "check that this is a case file"};
    if (open_.size() > deepest)
      throw Stop{mark, fmt::format("blocks nested more than {} deep", deepest), "at most 6 levels",
                 "check the brackets"};
    if (anchor != 0) throw anchor_refused(mark);
    if (!tag.empty() && tag != "?" && tag != "!")
      throw Stop{mark, "tags (" + shown(tag) + ") are not read", "the value itself",
                 "remove the tag, or put quotes round a text that begins with '!'"};
  }

  void note(Position at, std::string key, std::string what, std::string expected, std::string remedy) {
    document_.mistakes.push_back(
        {at, std::move(key), std::move(what), std::move(expected), std::move(remedy)});
  }

  void take_key(const YAML::Mark& mark, const std::string& key) {
    Frame& frame = open_.back();
    const Position at = text_.position(mark.line, mark.column);
    if (key == "<<")
      throw Stop{mark, "merging (<<) is not read", "the keys themselves", "write the keys out"};
    frame.key = key;
    frame.key_at = at;
    frame.wants_key = false;
    frame.key_refused = true;
    if (frame.skipped) return;
    if (key.empty() || key.size() > longest_value)
      note(at, frame.path, key.empty() ? "a key is empty" : "a key of this length is no key",
           "a word before the colon", "write the key");
    else if (key.find('.') != std::string::npos && !holds_dotted_keys(frame.path) &&
             !is_decimal_key(frame.path, key))
      note(at, joined(frame.path, key), "a key with dots", "one word before the colon",
           "nest the blocks, one word a level; dotted keys are for overlays only");
    else if (!frame.keys.insert(key).second)
      note(at, joined(frame.path, key), "the key is given twice",
           "each key once; the first is the one checked", "remove one of them");
    else
      frame.key_refused = false;
  }

  /// The dotted key of the value that comes next, or empty where it is to be skipped.
  /// Counts a list's items and makes a map want its next key.
  std::string next_path() {
    Frame& frame = open_.back();
    if (!frame.is_map) return frame.skipped ? "" : joined(frame.path, std::to_string(frame.items++));
    frame.wants_key = true;
    return frame.skipped || frame.key_refused ? "" : joined(frame.path, frame.key);
  }

  void add_leaf(const std::string& value, bool quoted, Position at) {
    const std::string path = next_path();
    if (path.empty()) return;
    const Position key_at = open_.back().is_map ? open_.back().key_at : at;
    if (at.line == 0) at = key_at.line == 0 ? open_.back().key_at : key_at;
    if (value.size() > longest_value) {
      note(at, path, fmt::format("a text of {} bytes", value.size()),
           fmt::format("at most {} bytes", longest_value), "shorten it, or look for a missing quote");
      return;
    }
    document_.leaves.emplace(path, Leaf{value, quoted, key_at.line == 0 ? at : key_at, at});
  }

  void open_block(const YAML::Mark& mark, bool is_map) {
    Frame frame;
    frame.is_map = is_map;
    if (!open_.empty()) {
      if (wants_key())
        throw Stop{mark, "a block or list stands where a key belongs", "a word before the colon",
                   "check the brackets, and put quotes round a key that holds them"};
      frame.path = next_path();
      frame.skipped = frame.path.empty();
      frame.key_at = open_.back().is_map ? open_.back().key_at : text_.position(mark.line, mark.column);
      if (!frame.skipped) document_.blocks.emplace(frame.path, Block{frame.key_at, !is_map});
    }
    open_.push_back(std::move(frame));
  }

  Document& document_;
  const RawText& text_;
  std::vector<Frame> open_;
  std::size_t nodes_ = 0;
  int documents_ = 0;
};

/// What to do about a text the YAML parser refuses, from the character it stopped at.
Stop explained(const YAML::Exception& error, const RawText& text) {
  const YAML::Mark at = error.mark;
  const char character = text.character(at.line, at.column);
  if (character == '*') return alias_refused(at);
  if (character == '&') return anchor_refused(at);
  if (character == '%' || character == '@' || character == '`')
    return {at, fmt::format("a value that begins with '{}'", character), "a value, or a text in quotes",
            fmt::format("remove the '{}', or put quotes round the text", character)};
  Stop stop{at, "not readable as YAML: " + shown(error.msg), "'key: value' lines or { } and [ ]",
            "check the indentation, brackets, quotes and colons from here upwards"};
  if (text.line(at.line - 1).find(" #") != std::string_view::npos)
    stop.remedy = "put quotes round the value above that holds ' #': what follows it is taken as a comment";
  return stop;
}

}  // namespace

Document read_document(std::string_view bytes, std::string file) {
  Document document;
  document.file = std::move(file);
  document.sha256 = sha256_of(bytes);
  const RawText text(bytes);
  if (auto mistake = text.mistake()) throw InputError(document.file, {*mistake});
  Builder builder(document, text);
  const auto stop = [&](const Stop& s) {
    // Where reading stops must be among the lines shown.
    auto mistakes = document.mistakes;
    if (mistakes.size() > most_before_stop) mistakes.resize(most_before_stop);
    mistakes.push_back({text.position(s.at.line, s.at.column), "", s.what, s.expected, s.remedy});
    throw InputError(document.file, std::move(mistakes));
  };
  try {
    std::istringstream stream{std::string(text.content())};
    YAML::Parser parser(stream);
    while (parser.HandleNextDocument(builder)) {
    }
  } catch (const Stop& s) {
    stop(s);
  } catch (const YAML::Exception& error) {
    stop(explained(error, text));
  }
  if (document.leaves.empty() && document.blocks.empty() && document.mistakes.empty())
    throw InputError(document.file, {{{1, 1},
                                      "",
                                      "the file is empty",
                                      "keys and values such as 'dutygauge: 1'",
                                      "begin from the starter case"}});
  return document;
}

}  // namespace dutygauge::case_io
