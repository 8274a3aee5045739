#include "files.hpp"

#include <fcntl.h>  // open; <fstream> cannot put a file on the disk for certain
#include <unistd.h> // write, fsync

#include <cerrno>
#include <cstdio> // rename, remove
#include <filesystem>
#include <fstream>
#include <stdexcept>
#include <string_view>
#include <system_error>

#include "refusal.hpp"

namespace skerry {
namespace {

/// A file that is open for as long as this lives.
class descriptor {
public:
    descriptor(const std::string& name, int flags) : number_(::open(name.c_str(), flags, 0666)) {}
    ~descriptor() {
        if (number_ >= 0) {
            ::close(number_);
        }
    }
    descriptor(const descriptor&) = delete;
    descriptor& operator=(const descriptor&) = delete;

    [[nodiscard]] bool is_open() const { return number_ >= 0; }
    [[nodiscard]] bool put(std::string_view text) const {
        while (!text.empty()) {
            const ssize_t count = ::write(number_, text.data(), text.size());
            if (count < 0 && errno != EINTR) {
                return false;
            }
            text.remove_prefix(count < 0 ? 0 : static_cast<std::size_t>(count));
        }
        return true;
    }
    [[nodiscard]] bool onto_disk() const { return ::fsync(number_) == 0; }

private:
    int number_;
};

void replace(const std::string& file, const std::string& text, bool onto_disk) {
    const std::string part = file + ".part";
    const bool written = [&] {
        const descriptor target(part, O_WRONLY | O_CREAT | O_TRUNC);
        return target.is_open() && target.put(text) && (!onto_disk || target.onto_disk());
    }();
    if (!written || std::rename(part.c_str(), file.c_str()) != 0) {
        const int why = errno;
        std::remove(part.c_str()); // a full disk needs the space
        throw std::runtime_error("cannot write " + file + ": " +
                                 std::generic_category().message(why));
    }
}

} // namespace

std::string read_file(const std::string& file) {
    std::ifstream stream(file, std::ios::binary);
    const bool opened = stream.is_open();
    std::string text;
    for (char block[4096]; stream.read(block, sizeof block) || stream.gcount() > 0;) {
        text.append(block, static_cast<std::size_t>(stream.gcount()));
    }
    if (!opened || stream.bad()) { // bad: a folder, on some systems
        throw refusal(file, "cannot be read");
    }
    return text;
}

void write_file(const std::string& file, const std::string& text) { replace(file, text, false); }

void write_file_to_disk(const std::string& file, const std::string& text) {
    replace(file, text, true);
    // The new name is on the disk when the folder is; not every file system can be asked for that.
    const std::filesystem::path folder = std::filesystem::path(file).parent_path();
    static_cast<void>(
        descriptor(folder.empty() ? "." : folder.string(), O_RDONLY | O_DIRECTORY).onto_disk());
}

} // namespace skerry
