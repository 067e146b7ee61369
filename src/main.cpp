#include <string>
#include <vector>

#include "stillcoat/present/command_line.hpp"

int main(int count, char** words) {
    return stillcoat::present::run(words[0], {words + 1, words + count});
}
