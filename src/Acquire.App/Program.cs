System.Console.WriteLine("acquire");
