// A C++17 program as a user writes it: errors as exceptions, arrays as vectors, a table handle with its own deleter.
#include <cmath>
#include <iostream>
#include <memory>
#include <stdexcept>
#include <string>
#include <vector>

#include "bondmoment.h"

namespace {

void check(const char *function, std::int32_t status)
{
  if (status == BMOM_OK) return;
  std::string words(200, '\0');
  std::int64_t needed = 0;
  bmom_status_message(function, -1, status, words.data(), static_cast<std::int64_t>(words.size()), &needed);
  words.resize(static_cast<std::size_t>(needed));
  throw std::runtime_error(words);
}

struct Free {
  void operator()(bmom_library *library) const { bmom_library_free(library); }
  void operator()(bmom_table *table) const { bmom_table_free(table); }
};

}  // namespace

int main()
{
  try {
    double chi = 0.0;
    check("electronegativity", bmom_electronegativity(BMOM_ELECTRONEGATIVITY_PAULING, 9, &chi, nullptr));
    std::cout << "fluorine: " << chi << '\n';
    if (std::abs(chi - 3.98) > 1e-12) return 1;  // CRC Handbook of Chemistry and Physics, section 9

    // q = mu/(e d) of a column: HF 1.826526 D at 0.916808 A and HCl 1.1086 D at 1.27455 A (from memory).
    const std::vector<double> dipole_D{1.826526, 1.1086}, length_A{0.916808, 1.27455};
    std::vector<double> charge_e(2);
    check("charge_from_dipole", bmom_charge_from_dipole_column(2, dipole_D.data(), nullptr, length_A.data(), nullptr,
                                                               charge_e.data(), nullptr, nullptr));
    std::cout << "HF " << charge_e[0] << " e, HCl " << charge_e[1] << " e\n";
    if (std::abs(charge_e[1] - 0.18109) > 1e-5 || !(charge_e[0] > charge_e[1])) return 2;

    const char frames[] = "3\nwater\nO 0 0 0\nH 0.96 0 0\nH -0.2404 -0.9294 0\n";
    bmom_library *made = nullptr;
    check("", bmom_library_parse(BMOM_FORMAT_XYZ, nullptr, 1, nullptr, frames, -1, &made));
    const std::unique_ptr<bmom_library, Free> library(made);
    bmom_table *filled = nullptr;
    check("", bmom_polarity_table(library.get(), nullptr, nullptr, 1, nullptr, 0, 1, &filled, nullptr, nullptr));
    const std::unique_ptr<bmom_table, Free> table(filled);
    std::int32_t column = 0, type = 0;
    check("", bmom_table_column(table.get(), "delta_chi", -1, &column, &type));
    double delta_chi = 0.0;
    check("", bmom_table_numbers(table.get(), column, 0, 1, &delta_chi, nullptr));
    std::cout << "O-H: " << delta_chi << '\n';
    if (type != BMOM_TYPE_NUMBER || std::abs(delta_chi - 1.24) > 1e-12) return 3;  // 3.44 - 2.20, the same column

    try {
      check("charge_from_dipole", bmom_charge_from_dipole(1.0, 0.0, 0.0, 0.0, &chi, nullptr));
      return 4;
    } catch (const std::runtime_error &error) {
      std::cout << error.what() << '\n';
      return std::string(error.what()) == "length_A must be above 0 \xc3\x85" ? 0 : 5;
    }
  } catch (const std::exception &error) {
    std::cerr << error.what() << '\n';
    return 6;
  }
}
