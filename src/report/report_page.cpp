#include <gapwright/report/report.hpp>

#include <cctype>
#include <stdexcept>
#include <string_view>

namespace gapwright {
namespace {

std::string escaped(const std::string& text) {
  std::string safe;
  for (const char c : text) {
    if (c == '&')
      safe += "&amp;";
    else if (c == '<')
      safe += "&lt;";
    else if (c == '>')
      safe += "&gt;";
    else
      safe += c;
  }
  return safe;
}

// Comments that send a browser after a file which is not there.
std::string without_source_maps(std::string text) {
  for (std::size_t at = 0; (at = text.find("# sourceMappingURL=", at)) != std::string::npos;) {
    const std::size_t end = text.find_first_of("\n*", at);
    text.erase(at, (end == std::string::npos ? text.size() : end) - at);
  }
  return text;
}

// Inside a script element neither its closing tag nor a comment may begin. Both stand in strings
// and patterns only, where a backslash changes nothing.
std::string script_text(const std::string& script) {
  const std::string text = without_source_maps(script);
  const auto begins = [&](std::size_t at, std::string_view what) {
    if (text.size() - at < what.size()) return false;
    for (std::size_t i = 0; i < what.size(); ++i)
      if (std::tolower(static_cast<unsigned char>(text[at + i])) != what[i]) return false;
    return true;
  };
  std::string safe;
  safe.reserve(text.size());
  for (std::size_t i = 0; i < text.size(); ++i) {
    safe += text[i];
    if (text[i] == '<' && (begins(i, "</script") || begins(i, "<!--"))) safe += '\\';
  }
  return safe;
}

void fill(std::string& page, const std::string& mark, const std::string& content) {
  const std::size_t at = page.find(mark);
  if (at == std::string::npos)
    throw std::invalid_argument("report_page: page, required a mark " + mark);
  page.replace(at, mark.size(), content);
}

}  // namespace

std::string report_page(const PageParts& parts, const std::string& title, const std::string& json) {
  std::string styles, scripts;
  for (const std::string& style : parts.styles) styles += without_source_maps(style) + "\n";
  for (const std::string& script : parts.scripts)
    scripts += "<script>\n" + script_text(script) + "\n</script>\n";
  std::string page = parts.page;
  // Scripts first: what a user wrote is put in last and never searched for marks.
  fill(page, "{{styles}}", styles);
  fill(page, "{{scripts}}", scripts);
  fill(page, "{{licences}}", escaped(parts.licences));
  const std::size_t data = page.find("{{data}}"), name = page.find("{{title}}");
  if (data == std::string::npos || name == std::string::npos || name > data)
    throw std::invalid_argument("report_page: page, required marks {{title}}, {{data}}");
  page.replace(data, 8, json);
  page.replace(name, 9, escaped(title));
  return page;
}

}  // namespace gapwright
