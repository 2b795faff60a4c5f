/// HDF5: files as others write them, and every refusal.
#include <fmt/format.h>
#include <gtest/gtest.h>
#include <hdf5.h>

#include <cmath>
#include <functional>
#include <string>

#include "tests/unit/files_support.hpp"

namespace cistern {
namespace {

using Lengths = std::vector<hsize_t>;

hid_t space_of(const Lengths& shape) {
  return shape.empty() ? H5Screate(H5S_SCALAR)
                       : H5Screate_simple(static_cast<int>(shape.size()), shape.data(), nullptr);
}

/// An HDF5 file written with the plain library.
class Hdf5Draft {
 public:
  explicit Hdf5Draft(const std::filesystem::path& path)
      : file_(H5Fcreate(path.c_str(), H5F_ACC_TRUNC, H5P_DEFAULT, H5P_DEFAULT)) {}
  ~Hdf5Draft() { H5Fclose(file_); }
  Hdf5Draft(const Hdf5Draft&) = delete;
  Hdf5Draft& operator=(const Hdf5Draft&) = delete;

  /// A dataset of one value everywhere. \param chunk  empty: contiguous
  Hdf5Draft& data(const char* name, hid_t type, const Lengths& shape, const Lengths& chunk = {}, int value = 1) {
    const hid_t properties = H5Pcreate(H5P_DATASET_CREATE);
    if (!chunk.empty()) H5Pset_chunk(properties, static_cast<int>(chunk.size()), chunk.data());
    if (!chunk.empty()) H5Pset_deflate(properties, 1);
    if (H5Tget_class(type) != H5T_STRING) H5Pset_fill_value(properties, H5T_NATIVE_INT, &value);
    const hid_t space = space_of(shape);
    H5Dclose(H5Dcreate2(file_, name, type, space, H5P_DEFAULT, properties, H5P_DEFAULT));
    H5Sclose(space);
    H5Pclose(properties);
    return *this;
  }
  Hdf5Draft& codes(const Lengths& shape = {3, 2, 10}) { return data("codes", H5T_STD_I16LE, shape); }
  Hdf5Draft& group(const char* name) {
    H5Gclose(H5Gcreate2(file_, name, H5P_DEFAULT, H5P_DEFAULT, H5P_DEFAULT));
    return *this;
  }
  Hdf5Draft& number(const char* object, const char* name, std::vector<double> values) {
    const hid_t space = values.size() == 1 ? H5Screate(H5S_SCALAR) : space_of({values.size()});
    const hid_t attribute =
        H5Acreate_by_name(file_, object, name, H5T_IEEE_F64LE, space, H5P_DEFAULT, H5P_DEFAULT, H5P_DEFAULT);
    H5Awrite(attribute, H5T_NATIVE_DOUBLE, values.data());
    H5Aclose(attribute);
    H5Sclose(space);
    return *this;
  }
  /// \param padding  how the text is filled up to `size`
  Hdf5Draft& text(const char* object, const char* name, std::string value, H5T_str_t padding = H5T_STR_NULLTERM,
                  std::size_t size = 40) {
    value.resize(size, padding == H5T_STR_SPACEPAD ? ' ' : '\0');
    const hid_t type = H5Tcopy(H5T_C_S1);
    H5Tset_size(type, size);
    H5Tset_strpad(type, padding);
    const hid_t space = H5Screate(H5S_SCALAR);
    const hid_t attribute = H5Acreate_by_name(file_, object, name, type, space, H5P_DEFAULT, H5P_DEFAULT, H5P_DEFAULT);
    H5Awrite(attribute, type, value.data());
    H5Aclose(attribute);
    H5Sclose(space);
    H5Tclose(type);
    return *this;
  }

 private:
  hid_t file_;
};

struct Refusal {
  const char* name;
  std::function<void(Hdf5Draft&)> write;
  std::vector<const char*> says;  ///< the place first
};

class Hdf5Refusals : public testing::TestWithParam<Refusal> {};

TEST_P(Hdf5Refusals, name_the_file_the_place_and_what_was_expected) {
  const TraceFolder folder;
  {
    Hdf5Draft draft(folder / "t.h5");
    GetParam().write(draft);
  }
  testing::internal::CaptureStderr();
  const std::string fault = fault_of_reading(folder / "t.h5");
  EXPECT_EQ(testing::internal::GetCapturedStderr(), "") << "HDF5 prints errors of its own";
  expect_refusal(fault, GetParam().says);
}

Refusal number(const char* name, const char* key, const std::vector<double>& values, std::vector<const char*> says) {
  return {name, [=](Hdf5Draft& f) { f.codes().number("/", key, values); }, std::move(says)};
}
Refusal text(const char* name, const char* key, const char* value, std::vector<const char*> says) {
  return {name, [=](Hdf5Draft& f) { f.codes().text("/", key, value); }, std::move(says)};
}
Refusal codes(const char* name, hid_t type, const Lengths& shape, std::vector<const char*> says) {
  return {name, [=](Hdf5Draft& f) { f.data("codes", type, shape); }, std::move(says)};
}
Refusal starts(const char* name, hid_t type, const Lengths& shape) {
  return {name, [=](Hdf5Draft& f) { f.codes().data("start_ns", type, shape); }, {"t.h5: /start_ns: is not one int64"}};
}
Refusal truth(const char* name, const std::function<void(Hdf5Draft&)>& write, std::vector<const char*> says) {
  return {name, [=](Hdf5Draft& f) { write(f.codes().group("truth")); }, std::move(says)};
}

std::vector<Refusal> refusals() {
  H5open();
  return {
      {"no_codes", [](Hdf5Draft&) {}, {"t.h5: has no dataset /codes"}},
      {"codes_is_a_group", [](Hdf5Draft& f) { f.group("codes"); }, {"t.h5: has no dataset /codes"}},
      codes("int32", H5T_STD_I32LE, {1, 2, 3}, {"t.h5: /codes: is not of 16-bit integers", "int16 or uint16"}),
      codes("int8", H5T_STD_I8LE, {1, 2, 3}, {"t.h5: /codes: is not of 16-bit integers"}),
      codes("half_precision", H5T_IEEE_F32LE, {1, 2, 3}, {"t.h5: /codes: is not of 16-bit integers"}),
      codes("text", H5T_C_S1, {1, 2, 3}, {"t.h5: /codes: is not of 16-bit integers"}),
      codes("two_dimensions", H5T_STD_I16LE, {2, 3}, {"t.h5: /codes: has 2 dimensions, expected three"}),
      codes("four_dimensions", H5T_STD_I16LE, {1, 1, 2, 3}, {"t.h5: /codes: has 4 dimensions, expected three"}),
      codes("one_number", H5T_STD_I16LE, {}, {"t.h5: /codes: has 0 dimensions, expected three"}),
      codes("no_traces", H5T_STD_I16LE, {0, 2, 3}, {"t.h5: /codes: the array has shape (0, 2, 3)"}),
      codes("no_samples", H5T_STD_I16LE, {1, 2, 0}, {"t.h5: /codes: the array has shape (1, 2, 0)"}),
      codes("seventeen_channels", H5T_STD_I16LE, {1, 17, 1}, {"t.h5: /codes: has 17 channels, expected 1 to 16"}),
      {"chunks_too_large",
       [](Hdf5Draft& f) {
         f.data("codes", H5T_STD_I16LE, {8, 16, 1 << 20}, {2, 16, 1 << 20});
       },
       {"t.h5: /codes: is packed in chunks of (2, 16, 1048576)", "32 MiB"}},
      {"negative_code",
       [](Hdf5Draft& f) {
         f.data("codes", H5T_STD_I16LE, {1, 2, 3}, {}, -5);
       },
       {"t.h5: trace 0, channel 0, sample 0: code is -5, expected 0 to 32767"}},
      {"uint16_that_does_not_fit",
       [](Hdf5Draft& f) {
         f.data("codes", H5T_STD_U16LE, {1, 2, 3}, {}, 32768);
       },
       {"t.h5: trace 0, channel 0, sample 0: code is 32768, expected 0 to 32767"}},
      {"code_above_its_bits",
       [](Hdf5Draft& f) {
         f.data("codes", H5T_STD_U16LE, {1, 2, 3}, {}, 256).number("/", "bits", {8});
       },
       {"t.h5: trace 0, channel 0, sample 0: code is 256, expected 0 to 255"}},
      number("rate_zero", "sample_rate_mhz", {0}, {"t.h5: attribute sample_rate_mhz", "more than 0"}),
      number("rate_nan", "sample_rate_mhz", {std::nan("")}, {"t.h5: attribute sample_rate_mhz"}),
      number("two_rates", "sample_rate_mhz", {1, 2}, {"t.h5: attribute sample_rate_mhz", "2 values, expected one"}),
      text("rate_as_text", "sample_rate_mhz", "100",
           {"t.h5: attribute sample_rate_mhz cannot be read, expected numbers"}),
      number("bits_too_many", "bits", {16}, {"t.h5: attribute bits", "bits is 16, expected 4 to 15"}),
      number("bits_not_whole", "bits", {12.5}, {"t.h5: attribute bits", "12.5", "whole"}),
      number("bits_huge", "bits", {1e300}, {"t.h5: attribute bits", "whole"}),
      number("bits_twice", "bits", {12, 12}, {"t.h5: attribute bits", "2 values, expected one"}),
      number("baselines_too_many", "baseline_counts", {1, 2, 3}, {"t.h5: attribute baseline_counts", "3 values"}),
      number("baseline_not_whole", "baseline_counts", {1.5}, {"t.h5: attribute baseline_counts", "1.5"}),
      number("baseline_negative", "baseline_counts", {-1, 2}, {"t.h5: attribute baseline_counts", "holds -1"}),
      number("list_too_long", "baseline_counts", std::vector<double>(17, 1.0),
             {"t.h5: attribute baseline_counts cannot be read"}),
      number("height_zero", "height_counts_per_vem", {0, 1}, {"t.h5: attribute height_counts_per_vem", "more than 0"}),
      number("area_infinite", "area_counts_per_vem", {1, INFINITY}, {"t.h5: attribute area_counts_per_vem"}),
      number("areas_too_many", "area_counts_per_vem", {1, 1, 1}, {"t.h5: attribute area_counts_per_vem", "3 values"}),
      number("live_time_negative", "live_time_s", {-1}, {"t.h5: attribute live_time_s"}),
      number("contiguous_two", "contiguous", {2}, {"t.h5: attribute contiguous", "0 or 1"}),
      text("contiguous_as_text", "contiguous", "true", {"t.h5: attribute contiguous"}),
      number("selection_as_number", "selection", {1}, {"t.h5: attribute selection cannot be read, expected one text"}),
      text("selection_unknown", "selection", "random", {"t.h5: attribute selection", "\"random\"", "unbiased or"}),
      text("selection_of_nothing", "selection", "triggered_by:", {"t.h5: attribute selection"}),
      text("name_misspelt", "selektion", "unbiased", {"t.h5: unknown attribute \"selektion\"; nearest: selection"}),
      {"file_and_codes_differ",
       [](Hdf5Draft& f) { f.codes().number("/", "bits", {12}).number("codes", "bits", {10}); },
       {"t.h5: attribute bits", "differs between the file and /codes"}},
      starts("starts_too_few", H5T_STD_I64LE, {2}),
      starts("starts_too_many", H5T_STD_I64LE, {4}),
      starts("starts_in_two_dimensions", H5T_STD_I64LE, {3, 1}),
      starts("starts_as_floats", H5T_IEEE_F64LE, {3}),
      starts("starts_unsigned", H5T_STD_U64LE, {3}),
      starts("starts_of_32_bits", H5T_STD_I32LE, {3}),
      {"starts_is_a_group", [](Hdf5Draft& f) { f.codes().group("start_ns"); }, {"t.h5: /start_ns: is not one int64"}},
      truth("truth_too_short", [](Hdf5Draft& f) { f.data("truth/size", H5T_IEEE_F64LE, {2}); }, {"t.h5: /truth/size"}),
      truth("truth_of_text", [](Hdf5Draft& f) { f.data("truth/size", H5T_C_S1, {3}); }, {"t.h5: /truth/size"}),
      truth("truth_is_a_group", [](Hdf5Draft& f) { f.group("truth/size"); }, {"t.h5: /truth/size"}),
      truth("truth_without_unit", [](Hdf5Draft& f) { f.data("truth/size", H5T_IEEE_F64LE, {3}); },
            {"t.h5: /truth/size: has no attribute unit"}),
      truth("unit_is_a_number",
            [](Hdf5Draft& f) { f.data("truth/size", H5T_IEEE_F64LE, {3}).number("truth/size", "unit", {1}); },
            {"t.h5: /truth/size: attribute unit cannot be read, expected one text"}),
  };
}

INSTANTIATE_TEST_SUITE_P(Table, Hdf5Refusals, testing::ValuesIn(refusals()),
                         [](const auto& row) { return std::string(row.param.name); });

TEST(Hdf5, what_is_no_hdf5_file_is_refused) {
  const TraceFolder folder;
  write_bytes(folder / "text.h5", "trace,sample,ch0\n0,0,1\n");
  EXPECT_EQ(fault_of_reading(folder / "text.h5"),
            "text.h5: does not start as an HDF5 file does; expected HDF5 with a dataset /codes");
  { Hdf5Draft(folder / "whole.h5").codes({100, 4, 100}); }
  write_bytes(folder / "cut.h5", bytes_of(folder / "whole.h5").substr(0, 1'000));
  EXPECT_EQ(fault_of_reading(folder / "cut.h5"), "cut.h5: cannot be read, expected an undamaged HDF5 file");
}

TEST(Hdf5, attributes_are_found_on_the_file_and_on_codes) {
  const TraceFolder folder;
  Hdf5Draft(folder / "t.h5")
      .codes()
      .number("/", "bits", {12})
      .number("codes", "bits", {12})
      .number("codes", "live_time_s", {2});
  const TraceFileInfo info = read_whole(folder / "t.h5").info;
  EXPECT_EQ(info.bits, 12);
  EXPECT_EQ(info.live_time_s, 2);
}

TEST(Hdf5, attributes_of_others_are_nobodys_business) {
  const TraceFolder folder;
  Hdf5Draft(folder / "t.h5").codes().text("/", "author", "me").number("codes", "temperature_c", {21});
  EXPECT_EQ(read_whole(folder / "t.h5").traces.size(), 3U);
}

TEST(Hdf5, one_value_stands_for_all_channels) {
  const TraceFolder folder;
  Hdf5Draft(folder / "t.h5").codes().number("/", "baseline_counts", {212}).number("/", "height_counts_per_vem", {140});
  const TraceFileInfo info = read_whole(folder / "t.h5").info;
  EXPECT_EQ(info.baseline_counts, (std::vector{212, 212}));
  EXPECT_EQ(info.height_counts_per_vem, (std::vector{140.0, 140.0}));
}

TEST(Hdf5, texts_are_read_however_they_are_filled_up) {
  const TraceFolder folder;
  for (const H5T_str_t padding : {H5T_STR_NULLTERM, H5T_STR_NULLPAD, H5T_STR_SPACEPAD}) {
    for (const std::size_t size : {8U, 30U}) {  // "unbiased" fills the first one without an end
      if (padding == H5T_STR_NULLTERM && size == 8) continue;
      { Hdf5Draft(folder / "t.h5").codes().text("/", "selection", "unbiased", padding, size); }
      EXPECT_EQ(read_whole(folder / "t.h5").info.selection, "unbiased") << padding << " " << size;
    }
  }
}

/// Chunks as others choose them; the large ones do not fit into one slab of the reader.
TEST(Hdf5, chunks_of_any_shape_are_read) {
  RandomStream stream(11, Purpose::PropertyTest, 0);
  const WholeFile file = random_file(6, 3, 70'000, 12, stream);
  const TraceFolder folder;
  for (const Lengths& chunk :
       {Lengths{1, 1, 1'000}, {6, 3, 70'000}, {4, 2, 999}, {1, 3, 70'000}, {5, 1, 777}, {2, 3, 65'536}}) {
    { Hdf5Draft(folder / "t.h5").data("codes", H5T_STD_U16BE, {6, 3, 70'000}, chunk); }
    const hid_t id = H5Fopen((folder / "t.h5").c_str(), H5F_ACC_RDWR, H5P_DEFAULT);
    const hid_t data = H5Dopen2(id, "codes", H5P_DEFAULT);
    std::vector<std::int16_t> all;
    for (const Codes& trace : file.traces) {
      for (std::size_t c = 0; c < 3; ++c) all.insert(all.end(), trace.channel(c).begin(), trace.channel(c).end());
    }
    H5Dwrite(data, H5T_NATIVE_INT16, H5S_ALL, H5S_ALL, H5P_DEFAULT, all.data());
    H5Dclose(data);
    H5Fclose(id);
    EXPECT_TRUE(have_equal_codes(read_whole(folder / "t.h5", 12'345), file))
        << chunk[0] << " " << chunk[1] << " " << chunk[2];
  }
}

TEST(Hdf5, truth_of_a_file_without_truth_is_empty_and_other_formats_have_none) {
  const TraceFolder folder;
  { Hdf5Draft(folder / "t.h5").codes(); }
  EXPECT_TRUE(read_truth(folder / "t.h5").empty());
  write_bytes(folder / "t.csv", "x");
  EXPECT_THROW((void)read_truth(folder / "t.csv"), InputError);
  EXPECT_THROW((void)read_truth(folder / "none.h5"), InputError);
}

}  // namespace
}  // namespace cistern
