/// \file
/// The SystemC library has a `main` that calls `sc_main`, and does not link without one. We start the kernel from our
/// own `main`, so it is never called.
extern "C" int sc_main(int /*count*/, char* /*arguments*/[]) { return 1; }
