using System.Reflection;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics.X86;
using InterfaceFE.Sparse;
using Xunit;

namespace InterfaceFE.Tests.Sparse;

/// <summary>Compares the three forms of each kernel. They are called by name, because test code has no pointers.</summary>
public class DenseKernelTests
{
    private const int Length = 4096;

    private static readonly nint Stride = 48;

    [Fact]
    public void Width_is_that_of_the_processor() =>
        Assert.Equal(Avx512F.IsSupported && Avx512DQ.IsSupported ? 512 : Avx2.IsSupported && Fma.IsSupported ? 256 : 64, DenseKernels.WidthBits);

    [Fact]
    public void All_forms_subtract_products_alike()
    {
        for (nint rows = 8; rows <= 48; rows += 8)
            foreach (nint depth in new nint[] { 0, 1, 7, 24 })
                for (int columns = 1; columns <= 8; columns++)
                    Agree(nameof(DenseKernels.SubtractProduct), m => [m.A, Stride, m.B, depth, m.C, Stride, rows, columns]);
    }

    [Fact]
    public void All_forms_pack_alike() => Agree(nameof(DenseKernels.Pack), m => [m.A, Stride, m.B, (nint)20, m.C]);

    [Fact]
    public void All_forms_solve_triangles_alike()
    {
        for (int width = 1; width <= 8; width++)
            Agree(nameof(DenseKernels.SolveTriangle), m => [m.C, Stride, (nint)40, m.A, Stride, m.B, width]);
    }

    [Fact]
    public void All_forms_add_alike()
    {
        for (nint count = 0; count < 40; count++)
            Agree(nameof(DenseKernels.Add), m => [m.C + sizeof(double), m.A + 3 * sizeof(double), count]);
    }

    [Fact]
    public void All_forms_take_columns_and_dots_alike()
    {
        for (int columns = 0; columns <= 11; columns++)
        {
            Agree(nameof(DenseKernels.SubtractColumns), m => [m.C, m.A, Stride, m.B, columns, (nint)40]);
            Agree(nameof(DenseKernels.SubtractDots), m => [m.C, m.A, Stride, m.B, columns, (nint)40]);
            Agree(nameof(DenseKernels.AddAbsoluteProducts), m => [m.C, m.A, m.A + 8 * sizeof(double), Stride, m.B, columns, (nint)40]);
        }
    }

    [Fact]
    public void All_forms_take_eight_lanes_alike()
    {
        for (int columns = 0; columns <= 9; columns++)
            foreach (nint rows in new nint[] { 0, 1, 5, 40 })
            {
                Agree(nameof(DenseKernels.SubtractLanes), m => [m.C, m.A, Stride, m.B, columns, rows]);
                Agree(nameof(DenseKernels.SubtractLaneDots), m => [m.C, m.A, Stride, m.B, columns, rows]);
            }
    }

    /// <summary>Runs each form that the processor has on the same numbers; entries that the portable one leaves alone must stay to the bit.</summary>
    private static void Agree(string kernel, Func<Memory, object[]> arguments)
    {
        double[] expected = Result(typeof(PortableKernels), kernel, arguments), before = Memory.Random().Third;
        var forms = new List<Type> { typeof(DenseKernels) };
        if (Avx2.IsSupported && Fma.IsSupported)
            forms.Add(typeof(DenseKernels256));
        if (Avx512F.IsSupported && Avx512DQ.IsSupported)
            forms.Add(typeof(DenseKernels512));
        foreach (Type form in forms)
        {
            double[] actual = Result(form, kernel, arguments);
            for (int i = 0; i < Length; i++)
                if (BitConverter.DoubleToInt64Bits(expected[i]) == BitConverter.DoubleToInt64Bits(before[i]))
                    Close.To(expected[i], actual[i], relative: 0, what: $"{form.Name} {kernel} untouched {i}");
                else
                    Close.To(expected[i], actual[i], relative: 1e-12, absolute: 1e-12, what: $"{form.Name} {kernel} {i}");
        }
    }

    private static double[] Result(Type form, string kernel, Func<Memory, object[]> arguments)
    {
        Memory memory = Memory.Random();
        form.GetMethod(kernel, BindingFlags.Static | BindingFlags.Public | BindingFlags.NonPublic)!.Invoke(null, arguments(memory));
        GC.KeepAlive(memory);
        return memory.Third;
    }

    /// <summary>Three pinned arrays with the same random numbers each time, and their addresses.</summary>
    private sealed record Memory(double[] First, double[] Second, double[] Third)
    {
        public nint A => Marshal.UnsafeAddrOfPinnedArrayElement(First, 0);

        public nint B => Marshal.UnsafeAddrOfPinnedArrayElement(Second, 0);

        public nint C => Marshal.UnsafeAddrOfPinnedArrayElement(Third, 0);

        public static Memory Random()
        {
            var random = new Random(1);
            return new Memory(Array(random), Array(random), Array(random));
        }

        private static double[] Array(Random random)
        {
            double[] values = GC.AllocateArray<double>(Length, pinned: true);
            for (int i = 0; i < Length; i++)
                values[i] = random.NextDouble() - 0.5;
            return values;
        }
    }
}
